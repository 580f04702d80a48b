/** The encodings a sheet can be read in, as the page names them. */
export const ENCODINGS = ["UTF-8", "UTF-16LE", "UTF-16BE", "Windows-1252"] as const;
export type Encoding = (typeof ENCODINGS)[number];
