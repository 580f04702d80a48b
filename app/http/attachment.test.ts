import { expect, test } from "vitest";
import { attachment } from "./attachment.ts";

test.each([
  ["sheet.csv", `attachment; filename="sheet.csv"; filename*=UTF-8''sheet.csv`],
  ['a "b".csv', `attachment; filename="a _b_.csv"; filename*=UTF-8''a%20%22b%22.csv`],
  [
    "Messwerte Frühling.csv",
    `attachment; filename="Messwerte Fruhling.csv"; filename*=UTF-8''Messwerte%20Fr%C3%BChling.csv`,
  ],
  ["表.csv", `attachment; filename=".csv"; filename*=UTF-8''%E8%A1%A8.csv`],
  ["it's (1).csv", `attachment; filename="it's (1).csv"; filename*=UTF-8''it%27s%20%281%29.csv`],
  ["表", `attachment; filename="download"; filename*=UTF-8''%E8%A1%A8`],
])("%s", (name, header) => {
  expect(attachment(name)).toBe(header);
});
