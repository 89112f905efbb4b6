/**
 * Column types used by every table, so that foreign keys meet columns of the same type. Ids are VARCHAR, not
 * CHAR: MariaDB refuses CHAR in the generated columns behind the "one standing … at a time" unique keys.
 */
export const ID = 'VARCHAR(36) CHARACTER SET ascii COLLATE ascii_bin';
export const DIGEST = 'VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin';
export const TIME = 'DATETIME(3)';
export const DOSE = 'DECIMAL(20,10)';
