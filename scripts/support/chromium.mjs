/** The names under which Debian and its kin install the browser of the tests. */
export const CHROMIUM_NAMES = ['chromium', 'chromium-browser'];

/** How the tests start it: without a screen, as root too, and without a call to anywhere. */
export const CHROMIUM_FLAGS = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-dev-shm-usage',
];
