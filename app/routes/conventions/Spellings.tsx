import type { ReadGroup, UnreadGroup } from "#app/thermo/spellings.ts";
import { Pieces } from "#app/ui/Pieces.tsx";
import { Table } from "#app/ui/Table.tsx";
import { speltPieces } from "./spelt.ts";

/** A text as a sheet holds it; what cannot be seen stands in words. */
export function Spelt({ text }: { text: string }) {
  if (text === "") return <i className="text-soft">an empty cell</i>;
  return (
    <code className="font-sans">
      {speltPieces(text).map((piece, index) =>
        "named" in piece ? (
          <span key={index} className="text-fine text-soft">
            {"\u2039"}
            {piece.named}
            {"\u203a"}
          </span>
        ) : (
          <Pieces key={index} pieces={[piece]} />
        ),
      )}
    </code>
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
          <tr>
            <th scope="rowgroup" colSpan={2} className="wide">
              {sentenceCase(why)}
            </th>
          </tr>
          {byReading(rows).map(([reading, texts]) => (
            <tr key={reading}>
              <th scope="row" className="tight">
                <Spelt text={reading} />
              </th>
              <td className="wide">
                {texts.map((text, index) => (
                  <span key={text}>
                    {index > 0 && <span className="text-pencil"> , </span>}
                    <Spelt text={text} />
                  </span>
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
export function UnreadTable({ caption, groups }: { caption: string; groups: readonly UnreadGroup[] }) {
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
          <tr>
            <th scope="rowgroup" colSpan={2} className="wide">
              {sentenceCase(why)}
            </th>
          </tr>
          {rows.map(([text, outcome]) => (
            <tr key={text}>
              <th scope="row" className="tight">
                <Spelt text={text} />
              </th>
              <td className="wide">
                {typeof outcome === "string" ? (
                  <>
                    refused: <span className="text-soft">… {outcome} …</span>
                  </>
                ) : (
                  <>
                    asked:{" "}
                    {outcome.map((reading, index) => (
                      <span key={reading}>
                        {index > 0 && " or "}
                        <Spelt text={reading} />
                      </span>
                    ))}
                  </>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      ))}
    </Table>
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
