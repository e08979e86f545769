/** Sizes that every door keeps to. */
const mebibyte = 1024 * 1024;

/** Bytes; a larger input file is refused before it is read. */
export const maxFileBytes = 64 * mebibyte;

/** Bytes of one call on the wire: a recording, dark, response and bench file in base64, with room to spare. */
export const maxCallBytes = 192 * mebibyte;

/** Characters of base64 that carry `maxFileBytes`. */
export const maxFileChars = 4 * Math.ceil(maxFileBytes / 3);
