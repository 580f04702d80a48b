import { createHash } from "node:crypto";
import { database } from "#app/db/database.server.ts";
import { type Edition, findDetailsAsOf, findSourceDetailsAsOf } from "./editions.queries.server.ts";
import { findSources, findSpeciesWithValues } from "./read.server.ts";
import { type BesideTheLines, csvFormat, type TableFormat } from "./tableFile.ts";
import { findIdsWithoutValue } from "./tableFile.queries.server.ts";

/** What is known of a file before its bytes are sent. */
export interface FileDigest {
  sha256: Buffer;
  /** In bytes. */
  length: number;
}

/** Species whose values are read at a time. */
const PORTION = 1_000;

/**
 * The file of an edition in portions; its values never stand in memory all at once. An edition never changes, so portions
 * read one after another belong together.
 */
export async function* tableFilePortions(
  edition: Edition,
  format: TableFormat = csvFormat,
  size = PORTION,
): AsyncGenerator<Buffer> {
  const n = edition.number;
  const details = await findDetailsAsOf(n, {}, database());
  const sources = await findSources(n);
  yield Buffer.from(format.head(edition, sources, details), "utf8");
  for (let first = 0; first < details.length; first += size) {
    const { species } = await findSpeciesWithValues(n, details.slice(first, first + size));
    const texts = species.map(({ detail, values }, index) =>
      format.species(edition, detail, values, sources, first + index === 0),
    );
    yield Buffer.from(texts.join(""), "utf8");
  }
  if (format.foot !== "") yield Buffer.from(format.foot, "utf8");
}

// What was hashed once need not be hashed again: an edition's file is bound to its digest. A cache of a few bytes each.
const known = new Map<string, FileDigest>();
const MOST_KNOWN = 1_000;

/** SHA-256 and length of an edition's file. */
export async function digestTableFile(edition: Edition, format: TableFormat = csvFormat): Promise<FileDigest> {
  const name = `${edition.digest.toString("hex")}.${format.extension}`;
  const found = known.get(name);
  if (found) return found;
  const hash = createHash("sha256");
  let length = 0;
  for await (const portion of tableFilePortions(edition, format)) {
    hash.update(portion);
    length += portion.length;
  }
  const digest = { sha256: hash.digest(), length };
  if (known.size >= MOST_KNOWN) known.clear();
  known.set(name, digest);
  return digest;
}

/** What belongs to an edition beside the lines of its CSV. */
export async function findBesideTheLines(edition: Edition): Promise<BesideTheLines> {
  const n = edition.number;
  const bare = await findIdsWithoutValue(n, database());
  return {
    sources: await findSourceDetailsAsOf(n, {}, database()),
    speciesWithoutValues: await findDetailsAsOf(n, { speciesIds: bare }, database()),
  };
}

/** The edition's file as a stream of bytes. */
export function streamTableFile(edition: Edition, format: TableFormat = csvFormat): ReadableStream<Uint8Array> {
  return streamOf(tableFilePortions(edition, format));
}

/** Portions of a file as a stream, each made when it is asked for. */
export function streamOf(source: AsyncGenerator<Buffer>): ReadableStream<Uint8Array> {
  return new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { done, value } = await source.next();
      if (done) controller.close();
      else controller.enqueue(new Uint8Array(value));
    },
    async cancel() {
      await source.return(undefined);
    },
  });
}
