/** Column types that every table shares, as SQL. */
export const id = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";
export const hash = "CHAR(64) CHARACTER SET ascii COLLATE ascii_bin";
export const statedHash = "CHAR(71) CHARACTER SET ascii COLLATE ascii_bin";
export const word = "VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin";
export const name = "VARCHAR(120)";
export const time = "DATETIME(3)";
