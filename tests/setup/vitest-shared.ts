import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The project's folder. */
export const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

/** `@/…` is the project's folder; `server-only` refuses plain Node.js, and tests run in it. */
export const ALIASES = [
  { find: /^@\//, replacement: `${ROOT}/` },
  { find: /^server-only$/, replacement: `${ROOT}/tests/setup/server-only.ts` },
];

export const NEVER_TESTS = ['node_modules/**', '.next/**', '.data/**', 'public/**'];
