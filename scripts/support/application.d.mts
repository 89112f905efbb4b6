import type { ChildProcess } from 'node:child_process';

type Variables = Record<string, string | undefined>;

export function startWeb(
  root: string,
  env: Variables,
  options?: { isDevelopment?: boolean; folder?: string },
): Promise<ChildProcess>;
export function startWorker(root: string, env: Variables): Promise<ChildProcess>;
