/* Stands for the package `server-only` in tests: it throws outside the server's bundle. */
export {};
