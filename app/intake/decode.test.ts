import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { decodeSheet, SHEET_LIMITS, type DecodedSheet } from "./decode.ts";

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text);

function decoded(input: string | Uint8Array): DecodedSheet {
  const result = decodeSheet(typeof input === "string" ? bytes(input) : input);
  if (result.outcome === "refused") throw new Error(result.sentence);
  return result.sheet;
}

function refusal(input: string | Uint8Array): string {
  const result = decodeSheet(typeof input === "string" ? bytes(input) : input);
  if (result.outcome === "decoded") throw new Error("was decoded");
  return result.sentence;
}

const inUtf16 = (text: string): number[] =>
  Array.from(text).flatMap((sign) => [sign.charCodeAt(0) & 0xff, sign.charCodeAt(0) >> 8]);
const swapped = (list: readonly number[]): number[] => list.map((_, index) => list[index ^ 1] ?? 0);

describe("encodings", () => {
  // The Windows code page: ± is B1, · is B7, the en dash 96, ° B0, Δ is not in it (the Unicode Consortium's CP1252 table).
  const text = "formula,S,remark\nH2O,69.95 ± 0.03,–20 °C\n";
  const cells = ["H2O", "69.95 ± 0.03", "–20 °C"];
  const ansi = Array.from(text, (sign) => (sign === "–" ? 0x96 : sign.charCodeAt(0)));

  test.each<[string, number[], string, boolean]>([
    ["UTF-8", [...bytes(text)], "UTF-8", false],
    ["UTF-8 with its mark", [0xef, 0xbb, 0xbf, ...bytes(text)], "UTF-8", true],
    ["UTF-16, low byte first, with its mark", [0xff, 0xfe, ...inUtf16(text)], "UTF-16LE", true],
    ["UTF-16, high byte first, with its mark", [0xfe, 0xff, ...swapped(inUtf16(text))], "UTF-16BE", true],
    ["UTF-16, low byte first", inUtf16(text), "UTF-16LE", false],
    ["UTF-16, high byte first", swapped(inUtf16(text)), "UTF-16BE", false],
    ["Windows-1252", ansi, "Windows-1252", false],
  ])("%s is told from its bytes", (_what, list, encoding, byteOrderMark) => {
    const sheet = decoded(Uint8Array.from(list));
    expect(sheet.dialect).toMatchObject({ encoding, byteOrderMark });
    expect(sheet.heads).toEqual(["formula", "S", "remark"]);
    expect(sheet.rows).toEqual([{ number: 2, cells }]);
  });

  test("a guess says why it was made and shows what it can be judged by; a proof says nothing", () => {
    expect(decoded(Uint8Array.from(ansi)).dialect.guessed).toEqual({
      why: "row 2 is not valid UTF-8",
      signs: [
        { sign: "±", row: 2 },
        { sign: "–", row: 2 },
        { sign: "°", row: 2 },
      ],
    });
    expect(decoded(text).dialect.guessed).toBeUndefined();
  });

  test("every byte from 80 to 9F is what the code page says, or refused", () => {
    // The Unicode Consortium's CP1252 table, 80 to 9F, with a space where it defines nothing.
    const table = "€ ‚ƒ„…†‡ˆ‰Š‹Œ Ž  ‘’“”•–—˜™š›œ žŸ";
    for (const [index, sign] of Array.from(table).entries()) {
      const list = Uint8Array.from([...bytes("formula,S\nH2O,"), 0x80 + index, 0x0a]);
      if (sign === " ") expect(refusal(list)).toMatch(/stands for no character/);
      else expect(decoded(list).rows[0]?.cells[1]).toBe(sign);
    }
  });

  test("the encoding can be chosen against the guess", () => {
    const latin = decodeSheet(bytes(text), "Windows-1252");
    expect(latin).toMatchObject({ sheet: { rows: [{ cells: ["H2O", "69.95 Â± 0.03", "â€“20 Â°C"] }] } });
    expect(decodeSheet(Uint8Array.from(ansi), "UTF-8")).toMatchObject({ outcome: "refused" });
  });

  test("a first row that names the delimiter is followed", () => {
    const sheet = decoded("sep=;\nformula;remark;S\nH2O;a,b;69,95\n");
    expect(sheet.dialect).toMatchObject({ delimiter: ";", decimalComma: true });
    expect(sheet.headRow).toBe(2);
    expect(sheet.rows.map((row) => row.number)).toEqual([1, 3]);
  });

  test("comments are no heads", () => {
    const sheet = decoded("# formula,phase of old\nformula,phase,S\nH2O,l,69.95\n");
    expect(sheet.headRow).toBe(2);
  });
});

describe("delimiter and decimal sign", () => {
  test.each([
    ["commas and points", "formula,phase,S\nH2O,l,69.95\n", ",", false],
    ["semicolons and decimal commas", "formula;phase;dHf;S\nNH3;g;-10,98;46,07\n", ";", true],
    ["a comma in a head of a semicolon sheet", "Stoff;dHf, kcal\nNH3;-10,98\n", ";", true],
    ["tabs", "formula\tphase\tS\nH2O\tl\t69.95\n", "\t", false],
    ["tabs with decimal commas", "formula\tphase\tS\nH2O\tl\t69,95\n", "\t", true],
    ["three decimals behind every comma", "formula;phase;dHf\nH2O;l;-285,830\nCO2;g;-393,510\n", ";", true],
    ["thousands marks", 'formula,phase,dHf\nCaCO3,cr,"-1,206.92"\nCaO,cr,-635.09\n', ",", false],
    ["semicolons inside descriptions", 'formula,phase,d,S\nA,g,"a; b",1.5\nB,g,c; d,2.5\n', ",", false],
  ])("%s", (_what, text, delimiter, decimalComma) => {
    expect(decoded(text).dialect).toMatchObject({ delimiter, decimalComma });
  });
});

describe("row numbers are lines of the file", () => {
  test("the heads are row 1, and a line end inside quotation marks counts", () => {
    const sheet = decoded('formula,remark,S\nH2O,"two\nlines",69.95\n\nCO,one,197.66');
    expect(sheet.headRow).toBe(1);
    expect(sheet.rows.map((row) => [row.number, row.cells[0]])).toEqual([
      [2, "H2O"],
      [4, ""],
      [5, "CO"],
    ]);
  });

  test("carriage returns count once, alone or with a line feed", () => {
    expect(decoded("a,formula\r\n1.0,H2O\r\n2.0,CO").rows.map((row) => row.number)).toEqual([2, 3]);
    expect(decoded("a,formula\r1.0,H2O\r2.0,CO").rows.map((row) => row.number)).toEqual([2, 3]);
  });

  test("titles above the heads are rows too", () => {
    const sheet = decoded("Values of spring\n\nformula,phase,S\nH2O,l,69.95\n");
    expect(sheet.headRow).toBe(3);
    expect(sheet.heads).toEqual(["formula", "phase", "S"]);
    expect(sheet.rows.map((row) => row.number)).toEqual([1, 2, 4]);
  });

  test("cells keep their text to the letter, and empty heads at the end are not columns", () => {
    const sheet = decoded("formula,phase,S,\nH2O, l ,69.950 ,\n");
    expect(sheet.heads).toEqual(["formula", "phase", "S"]);
    expect(sheet.rows[0]?.cells).toEqual(["H2O", " l ", "69.950 ", ""]);
  });
});

test("a byte order mark is taken off and remembered", () => {
  const sheet = decoded(Uint8Array.from([0xef, 0xbb, 0xbf, ...bytes("formula,S\nH2O,69.95")]));
  expect(sheet.heads).toEqual(["formula", "S"]);
  expect(sheet.dialect.byteOrderMark).toBe(true);
});

test("heads that are names of the language's own are only texts", () => {
  const sheet = decoded("__proto__,constructor,toString\nformula,H2O,1.5\n");
  expect(sheet.heads).toEqual(["__proto__", "constructor", "toString"]);
});

describe("what is not a sheet is refused with a sentence", () => {
  test.each<[string, string | Uint8Array, RegExp]>([
    ["a zip archive", Uint8Array.from([0x50, 0x4b, 3, 4, 20, 0]), /zip archive.*CSV in UTF-8/],
    ["a picture", Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]), /picture/],
    [
      "UTF-16 cut off",
      Uint8Array.from([0xff, 0xfe, ...inUtf16("formula,S\nH2O,69.95"), 0x31]),
      /middle of a character/,
    ],
    ["half a character of UTF-16", Uint8Array.from([0xff, 0xfe, 0x00, 0xd8, 0x2c, 0x00]), /half of a character/],
    ["a NUL in UTF-16", Uint8Array.from([0xff, 0xfe, ...inUtf16("formula,S\nH2O,6\0")]), /Row 2 holds a NUL/],
    [
      "the mark of UTF-8 before other bytes",
      Uint8Array.from([0xef, 0xbb, 0xbf, ...bytes("a,b\n"), 0xb0]),
      /Row 2 is not/,
    ],
    ["a delimiter that is not read", "sep=|\nformula|S\nH2O|69.95\n", /names a delimiter/],
    ["a NUL byte", "formula,S\nH2O,69\u0000.95\n", /Row 2 holds a NUL byte/],
    // Windows-1252 defines no character at 81, 8D, 8F, 90 and 9D (hexadecimal).
    ["bytes of no encoding", Uint8Array.from([...bytes("formula,S\nH2O,1\nX"), 0xb0, 0x9d]), /row 3 holds the byte 9D/],
    ["control characters", Uint8Array.from([...bytes("formula,S\nH2O,1"), 0x07, 0xb1]), /row 2 holds the byte 07/],
    ["nothing", "", /empty/],
    ["blank lines", "\n \n", /empty/],
    ["heads only", "formula,phase,S\n", /heads and no rows/],
    ["heads and blank rows", "formula,phase,S\n,,\n\n", /heads and no rows/],
    ["prose", "Dear colleague\nplease find the values\n", /divided into columns/],
    ["values without heads", "H2O,l,69.95\nCO,g,197.66\n", /No row names the columns/],
    ["a quotation mark never closed", 'formula,S\n"H2O,69.95\nCO,197.66\n', /Row 2: a quotation mark/],
  ])("%s", (_what, input, sentence) => {
    expect(refusal(input)).toMatch(sentence);
  });
});

describe("limits", () => {
  test("one byte too many", () => {
    const heads = bytes("formula,S\nH2O,");
    const large = new Uint8Array(SHEET_LIMITS.bytes + 1).fill(0x20);
    large.set(heads);
    expect(refusal(large)).toMatch(/larger than 10 MB/);
  });

  test("one row too many", () => {
    const row = "H2O,69.95\n";
    expect(decoded(`formula,S\n${row.repeat(SHEET_LIMITS.rows)}`).rows).toHaveLength(SHEET_LIMITS.rows);
    expect(refusal(`formula,S\n${row.repeat(SHEET_LIMITS.rows + 1)}`)).toMatch(/more than 20,000 rows/);
  });

  test("one column too many", () => {
    expect(refusal(`formula,S\nH2O${",1".repeat(SHEET_LIMITS.columns)}\n`)).toMatch(/Row 2 has 201 columns/);
  });

  test("one character too many in a cell", () => {
    expect(refusal(`formula,remark\nH2O,${"x".repeat(SHEET_LIMITS.cell + 1)}\n`)).toMatch(
      /Row 2, column 2: the cell has 2001/,
    );
  });
});

test.each([
  ["codata-key-values.csv", 151, 9],
  ["nbs-1982-excerpt.csv", 83, 7],
  ["nbs-1982-heat-capacities.csv", 129, 4],
])("%s has %i rows and %i columns", (name, rows, columns) => {
  const sheet = decoded(readFileSync(new URL(`../../fixtures/${name}`, import.meta.url)));
  expect(sheet.heads).toHaveLength(columns);
  expect(sheet.rows).toHaveLength(rows);
  expect(sheet.rows.every((row) => row.cells.length === columns)).toBe(true);
  expect(sheet.rows.at(-1)?.number).toBe(rows + 1);
});
