/** What is larger is refused at once, so that no file can make the program hang. */

/** Bytes of one export: 64 MiB. */
export const MAX_EXPORT_BYTES = 64 * 1024 * 1024;
export const MAX_LINES = 2_000_000;
/** Characters of one line; a spectrum of 20,000 points across one row takes a quarter of it. */
export const MAX_LINE_LENGTH = 1_000_000;
export const MAX_COLUMNS = 10_000;
