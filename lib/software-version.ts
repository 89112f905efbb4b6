import packageFile from '../package.json';

/** The version of the software, stored with everything it computes. */
export const SOFTWARE_VERSION = `stepwell ${packageFile.version}`;
