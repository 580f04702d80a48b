/**
 * The Content-Disposition of a download under a name that somebody else chose (RFC 6266): a plain fallback for old
 * readers, and the whole name in the encoding of RFC 8187.
 */
export function attachment(name: string): string {
  const plain = name
    .normalize("NFKD")
    .replace(/[^\x20-\x7e]/g, "")
    .replace(/["\\%/]/g, "_")
    .trim();
  const encoded = encodeURIComponent(name).replace(
    /['()*]/g,
    (character) => `%${character.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain === "" ? "download" : plain}"; filename*=UTF-8''${encoded}`;
}
