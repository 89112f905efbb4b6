/**
 * Runs in the browser before anything else. The content security policy forbids making code from text, so zod is
 * told not to try (its probe alone would be reported as a violation).
 */
const browser = globalThis as typeof globalThis & { __zod_globalConfig?: { jitless?: boolean } };
browser.__zod_globalConfig = Object.assign(browser.__zod_globalConfig ?? {}, { jitless: true });

export {};
