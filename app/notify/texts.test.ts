import { expect, test } from "vitest";
import { invitationLetter, LINK_LINE, passwordChangedLetter, resetLetter } from "./texts.ts";

test.each([
  ["invitation", invitationLetter({ name: "Mina Corvin", invitedBy: "Pell Ostrander", days: 7 })],
  ["reset", resetLetter({ name: "Mina Corvin", minutes: 60 })],
])("the letter of %s has one place for its link, on a line of its own, and none in its subject", (_kind, letter) => {
  expect(letter.body.split("\n").filter((line) => line === LINK_LINE)).toHaveLength(1);
  expect(letter.subject).not.toContain(LINK_LINE);
});

test("a name cannot place the link: names hold no line break, and the link needs a line of its own", () => {
  const letter = resetLetter({ name: LINK_LINE, minutes: 60 });
  expect(letter.body.split("\n").filter((line) => line === LINK_LINE)).toHaveLength(1);
});

test("a letter that tells of a changed password carries no link", () => {
  expect(passwordChangedLetter({ name: "Mina Corvin" }).body).not.toMatch(/https?:|\{link\}/);
});
