import { database } from "#app/db/database.server.ts";
import { findDetailsAsOf, findValuesAsOf, type SourceAsOf } from "./editions.queries.server.ts";
import { findSpeciesOn } from "./sourcePage.queries.server.ts";
import { fileHead, fileLine } from "./tableFile.ts";
import { streamOf } from "./tableFile.server.ts";

/** Species whose values are read at a time. */
const PORTION = 1_000;

/** The lines of an edition's CSV that lean on one source, with the same columns as the whole file. */
export async function* sourceFilePortions(n: number, source: SourceAsOf, size = PORTION): AsyncGenerator<Buffer> {
  const { sourceId } = source;
  const sources = new Map([[sourceId, source]]);
  yield Buffer.from(fileHead(), "utf8");
  const all = await findSpeciesOn(n, sourceId, null, null, database());
  for (let first = 0; first < all.length; first += size) {
    const speciesIds = all.slice(first, first + size);
    const details = new Map(
      (await findDetailsAsOf(n, { speciesIds }, database())).map((detail) => [detail.speciesId, detail]),
    );
    const values = await findValuesAsOf(n, { speciesIds, sourceIds: [sourceId] }, database());
    const lines = values.flatMap((value) => {
      const detail = details.get(value.speciesId);
      return detail ? [fileLine({ edition: n, value, detail, sources })] : [];
    });
    yield Buffer.from(lines.join(""), "utf8");
  }
}

/** Those lines as a stream of bytes. */
export function streamSourceFile(n: number, source: SourceAsOf): ReadableStream<Uint8Array> {
  return streamOf(sourceFilePortions(n, source));
}
