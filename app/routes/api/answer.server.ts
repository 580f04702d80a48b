import type { Edition } from "#app/editions/editions.queries.server.ts";
import type { ResolvedEdition } from "#app/editions/resolve.server.ts";
import { csvFormat, fileName, type TableFormat } from "#app/editions/tableFile.ts";
import { digestTableFile, streamTableFile } from "#app/editions/tableFile.server.ts";
import { bodyDigest, jsonAnswer, type Keeping, keptAnswer } from "#app/http/caching.server.ts";
import { BadRequest, Invalid } from "#app/http/errors.ts";
import { readCursor } from "./shape.ts";

/**
 * How an answer about an edition is kept: for good under its number; for moments under "current", with the numbered
 * address named.
 * @param numbered the same address with the edition's number, query included
 */
export function keepingOf(
  { isCurrent }: ResolvedEdition,
  numbered: string,
): { keeping: Keeping; headers: Record<string, string> } {
  return isCurrent
    ? { keeping: "current", headers: { "Content-Location": numbered } }
    : { keeping: "frozen", headers: {} };
}

/** The query of a request as it came, with its question mark, or nothing. */
export function searchOf(request: Request): string {
  return new URL(request.url).search;
}

/** The same page's address with another cursor: what a Link header's rel=next leads to. */
export function nextLink(request: Request, path: string, cursor: string): string {
  const query = new URL(request.url).searchParams;
  query.set("cursor", cursor);
  return `<${path}?${query.toString()}>; rel="next"`;
}

/** A page of a list that may change, with the way to the next one; `path` is the list's address. */
export function listAnswer(
  request: Request,
  body: object,
  { next, path }: { next: string | null; path: string },
): Response {
  const headers: Record<string, string> = next === null ? {} : { Link: nextLink(request, path, next) };
  return jsonAnswer(request, { ...body, next }, { keeping: "asked", headers });
}

/**
 * The place a cursor stands for.
 * @throws Invalid when the cursor is none that a page gave out
 */
export function placeOf(cursor: string | undefined, parts: number): string[] | null {
  if (cursor === undefined) return null;
  const place = readCursor(cursor, parts);
  if (place) return place;
  throw noCursor();
}

function noCursor(
  detail = "This is no cursor that a page gave out. Leave it out to begin at the first page.",
): Invalid {
  return new Invalid(detail, [{ pointer: "/cursor", detail }]);
}

/**
 * The numbers of a place.
 * @throws Invalid when a part of it is no whole number
 */
export function numbersOf(place: readonly string[] | null): number[] {
  return (place ?? []).map((part) => {
    if (!/^\d{1,9}$/.test(part)) throw noCursor();
    return Number(part);
  });
}

/**
 * The place of a cursor that holds within certain editions, which stand in it first.
 * @throws Invalid when the cursor is none, or of other editions
 */
export function placeWithin(editions: readonly number[], cursor: string | undefined, parts: number): string[] | null {
  const place = placeOf(cursor, editions.length + parts);
  if (place === null) return null;
  const [own, rest] = [place.slice(0, editions.length), place.slice(editions.length)];
  if (own.some((edition, index) => edition !== String(editions[index]))) {
    throw noCursor(`This cursor is of edition ${own.join(" and ")}. Follow the Link header, which names the edition.`);
  }
  return rest;
}

/** @throws BadRequest when a parameter is given together with others that it makes meaningless */
export function alone(name: string, given: Readonly<Record<string, unknown>>, others: readonly string[]): void {
  const clash = others.find((other) => given[other] !== undefined);
  if (clash) throw new BadRequest(`The parameter "${name}" names one species by itself; leave "${clash}" out.`);
}

/** The answer that downloads a whole edition in one form, for programs and for people alike. */
export async function tableFileAnswer(
  request: Request,
  edition: Edition,
  keeping: Keeping,
  headers: Readonly<Record<string, string>>,
  format: TableFormat = csvFormat,
): Promise<Response> {
  const { sha256, length } = await digestTableFile(edition, format);
  const head = {
    contentType: format.contentType,
    keeping,
    headers: { "Content-Disposition": `attachment; filename="${fileName(edition.number, format)}"`, ...headers },
  };
  return keptAnswer(request, head, bodyDigest(sha256, length), () => streamTableFile(edition, format));
}
