/** Builds the production server when the build is older than the sources. */
export function ensureBuild(
  root: string,
  options: { say: (text: string) => void; children?: Set<unknown>; log?: string },
): Promise<void>;
