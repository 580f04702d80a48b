import { randomUUID } from "node:crypto";

/** An id for a source that is new to the table. It says nothing about the source, so nothing ever makes it wrong. */
export function newSourceId(): string {
  return `src_${randomUUID().replaceAll("-", "")}`;
}
