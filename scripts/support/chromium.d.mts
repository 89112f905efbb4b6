export const CHROMIUM_NAMES: readonly string[];
export const CHROMIUM_FLAGS: readonly string[];
