/** What may stand before a DOI when somebody copies one: an address of the resolver, or the scheme's name. */
const PREFIX = /^(?:https?:\/\/(?:dx\.)?doi\.org\/|doi:\s*)/i;

/**
 * Syntax of a DOI (ISO 26324): the directory 10, a registrant code of digits that may have parts, a slash, and a suffix
 * of printing characters. Whether it is registered cannot be known here.
 */
const DOI = /^10\.\d{4,9}(?:\.\d+)*\/[^\s"<>\\^`{|}]+$/;

/** The bare DOI in what somebody typed or pasted: "https://doi.org/10.1021/ic020222t" becomes "10.1021/ic020222t". */
export function bareDoi(text: string): string {
  return text.trim().replace(PREFIX, "");
}

/** Whether a bare DOI is written as one must be. */
export function isDoi(text: string): boolean {
  return DOI.test(text);
}

/** The address at which a DOI is resolved. Characters with a meaning in an address are encoded. */
export function doiAddress(doi: string): string {
  return `https://doi.org/${encodeURI(doi).replace(/[?#]/g, encodeURIComponent)}`;
}

/** The form in which two DOIs are compared: they are the same whatever their case. */
export function comparableDoi(doi: string): string {
  return bareDoi(doi).toLowerCase();
}
