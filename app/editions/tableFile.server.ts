import { createHash } from "node:crypto";
import { database } from "#app/db/database.server.ts";
import { type Edition, findDetailsAsOf, findValuesAsOf } from "./editions.queries.server.ts";
import { findSources } from "./read.server.ts";
import { fileHead, fileLine } from "./tableFile.ts";

/** What is known of a file before its bytes are sent. */
export interface FileDigest {
  sha256: Buffer;
  /** In bytes. */
  length: number;
}

/** Species whose values are read at a time. */
const PORTION = 1_000;

/**
 * The lines of an edition's CSV in portions; its values never stand in memory all at once. An edition never changes, so
 * portions read one after another belong together.
 */
export async function* tableFilePortions(n: number, size = PORTION): AsyncGenerator<Buffer> {
  const details = await findDetailsAsOf(n, {}, database());
  const sources = await findSources(n);
  yield Buffer.from(fileHead(), "utf8");
  for (let first = 0; first < details.length; first += size) {
    const portion = new Map(details.slice(first, first + size).map((detail) => [detail.speciesId, detail]));
    const values = await findValuesAsOf(n, { speciesIds: [...portion.keys()] }, database());
    const lines = values.flatMap((value) => {
      const detail = portion.get(value.speciesId);
      return detail ? [fileLine({ edition: n, value, detail, sources })] : [];
    });
    yield Buffer.from(lines.join(""), "utf8");
  }
}

// What was hashed once need not be hashed again: an edition's file is bound to its digest. A cache of a few bytes each.
const known = new Map<string, FileDigest>();
const MOST_KNOWN = 1_000;

/** SHA-256 and length of an edition's CSV. */
export async function digestTableFile(edition: Edition): Promise<FileDigest> {
  const name = edition.digest.toString("hex");
  const found = known.get(name);
  if (found) return found;
  const hash = createHash("sha256");
  let length = 0;
  for await (const portion of tableFilePortions(edition.number)) {
    hash.update(portion);
    length += portion.length;
  }
  const digest = { sha256: hash.digest(), length };
  if (known.size >= MOST_KNOWN) known.clear();
  known.set(name, digest);
  return digest;
}

/** The edition's CSV as a stream of bytes. */
export function streamTableFile(edition: Edition): ReadableStream<Uint8Array> {
  return streamOf(tableFilePortions(edition.number));
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
