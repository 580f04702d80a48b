import { Fragment } from "react";
import type { ReadGroup } from "#app/thermo/spellings.ts";
import { Pieces } from "#app/ui/Pieces.tsx";
import { Table } from "#app/ui/Table.tsx";
import { speltPieces } from "./spelt.ts";
import type { ToldGroup } from "./unread.ts";

/** A text as a sheet holds it; what cannot be seen stands in words. */
export function Spelt({ text }: { text: string }) {
  if (text === "") return <i className="text-soft">an empty cell</i>;
  return (
    <code className="font-sans">
      <SpeltRuns text={text} />
    </code>
  );
}

function SpeltRuns({ text }: { text: string }) {
  return speltPieces(text).map((piece, index) =>
    "named" in piece ? (
      <span key={index} className="text-fine text-soft">
        {"\u2039"}
        {piece.named}
        {"\u203a"}
      </span>
    ) : (
      <Pieces key={index} pieces={[piece]} />
    ),
  );
}

/** Spellings that are read, by what they have in common: the readings, and behind each all its spellings. */
export function ReadTable({ caption, groups }: { caption: string; groups: readonly ReadGroup[] }) {
  return (
    <Table caption={caption} even>
      <thead>
        <tr>
          <th scope="col">Read as</th>
          <th scope="col">Written in a sheet</th>
        </tr>
      </thead>
      {groups.map(({ why, rows }) => (
        <tbody key={why}>
          <GroupHead why={why} />
          {byReading(rows).map(([reading, texts]) => (
            <tr key={reading}>
              <th scope="row" className="tight">
                <Spelt text={reading} />
              </th>
              <td className="wide">
                {texts.map((text) => (
                  <Fragment key={text}>
                    <span className="mr-6 inline-block">
                      <Spelt text={text} />
                    </span>{" "}
                  </Fragment>
                ))}
              </td>
            </tr>
          ))}
        </tbody>
      ))}
    </Table>
  );
}

/** Spellings that are refused or asked about, by their reason. */
export function UnreadTable({ caption, groups }: { caption: string; groups: readonly ToldGroup[] }) {
  return (
    <Table caption={caption} even>
      <thead>
        <tr>
          <th scope="col">Written in a sheet</th>
          <th scope="col">What happens</th>
        </tr>
      </thead>
      {groups.map(({ why, rows }) => (
        <tbody key={why}>
          <GroupHead why={why} />
          {rows.map(({ text, sentence, readings }) => (
            <tr key={text}>
              <th scope="row" className="tight">
                <Spelt text={text} />
              </th>
              <td className="wide">
                {readings.length > 0 ? (
                  <>
                    asked:{" "}
                    {readings.map((reading, index) => (
                      <Fragment key={reading}>
                        {index > 0 && <span className="text-soft"> or </span>}
                        <Spelt text={reading} />
                      </Fragment>
                    ))}
                  </>
                ) : (
                  <span className="text-soft">
                    <SpeltRuns text={sentence} />
                  </span>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      ))}
    </Table>
  );
}

function GroupHead({ why }: { why: string }) {
  return (
    <tr>
      <th scope="rowgroup" colSpan={2} className="wide">
        <span className="block pt-3 font-semibold">{sentenceCase(why)}</span>
      </th>
    </tr>
  );
}

/** Spellings of one reading side by side, in the order in which the readings first come. */
function byReading(rows: ReadGroup["rows"]): [reading: string, texts: string[]][] {
  const found = new Map<string, string[]>();
  for (const [text, reading] of rows) found.set(reading, [...(found.get(reading) ?? []), text]);
  return [...found];
}

function sentenceCase(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
