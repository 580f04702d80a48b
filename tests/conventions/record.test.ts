import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import ts from "typescript";
import { describe, expect, test } from "vitest";
import { acts } from "#app/audit/acts.ts";

/*
 * The record is complete: whatever changes something does so in an act, every act puts itself on record, and every kind of
 * act that the list knows is one that somebody does. Read from the program's text, so that no act is forgotten because no
 * test happens to run it.
 */

const root = path.resolve(import.meta.dirname, "../..");

interface Source {
  file: string;
  tree: ts.SourceFile;
}

const servers: Source[] = readdirSync(path.join(root, "app"), { recursive: true, encoding: "utf8" })
  .map((name) => `app/${name.split(path.sep).join("/")}`)
  .filter((file) => file.endsWith(".server.ts") && file !== "app/audit/act.server.ts")
  .map((file) => ({
    file,
    tree: ts.createSourceFile(file, readFileSync(path.join(root, file), "utf8"), ts.ScriptTarget.Latest, true),
  }));

function* nodesIn(node: ts.Node): Generator<ts.Node> {
  yield node;
  for (const child of node.getChildren()) yield* nodesIn(child);
}

const calls = (node: ts.Node): ts.CallExpression[] => [...nodesIn(node)].filter((one) => ts.isCallExpression(one));
const nameOf = ({ expression }: ts.CallExpression): string =>
  ts.isPropertyAccessExpression(expression) ? expression.name.text : expression.getText();

/** The function around a node that has a name, for messages and lists. */
function functionAround(node: ts.Node): string {
  for (let at: ts.Node | undefined = node; at; at = at.parent) {
    if (ts.isFunctionDeclaration(at) && at.name) return at.name.text;
    if (ts.isVariableDeclaration(at) && at.parent.parent.parent.kind === ts.SyntaxKind.SourceFile)
      return at.name.getText();
  }
  return "the module";
}

/** Functions that are handed the way to record, and use it: helpers of acts. */
const recording = new Set(
  servers.flatMap(({ tree }) =>
    [...nodesIn(tree)]
      .filter((node) => ts.isFunctionDeclaration(node))
      .filter((node) => node.parameters.some((parameter) => /\b(ActScope|record|scope)\b/.test(parameter.getText())))
      .filter((node) => calls(node).some((call) => nameOf(call) === "record"))
      .map((node) => node.name?.text ?? ""),
  ),
);

/** Calls inside an act that put something on record, by themselves or through a helper. */
function recordsIn(work: ts.Node): ts.CallExpression[] {
  return calls(work).filter((call) => {
    if (nameOf(call) === "record") return true;
    return (
      recording.has(nameOf(call)) && call.arguments.some((one) => /^(scope|record)$|\brecord\b/.test(one.getText()))
    );
  });
}

/** Whether a call is reached only under some condition of the act. */
function isConditional(call: ts.Node, work: ts.Node): boolean {
  for (let at = call; at !== work; at = at.parent) {
    if (ts.isConditionalExpression(at.parent) || ts.isForOfStatement(at.parent) || ts.isCaseClause(at.parent))
      return true;
    if (ts.isIfStatement(at.parent)) {
      const { thenStatement, elseStatement } = at.parent;
      const both = elseStatement && [thenStatement, elseStatement].every((branch) => recordsIn(branch).length > 0);
      if (!both) return true;
    }
  }
  return false;
}

const workOf = servers.flatMap(({ file, tree }) =>
  calls(tree)
    .filter((call) => call.expression.getText() === "act" && call.arguments.length === 2)
    .map((call) => ({ name: `${file}: ${functionAround(call)}`, work: call.arguments[1]! })),
);

/** Acts that leave no entry, or not always one. */
const NOTHING_TO_RECORD: Readonly<Record<string, string>> = {
  "app/intake/readSheet.server.ts: readSheet": "a batch of rows is progress; the reading is recorded when it is done",
  "app/people/apiKey.server.ts: noteFirstUse": "of several first requests with a key, one is the first",
  "app/people/people.server.ts: changeAccount": "name and address have an entry each; both the same is refused before",
};

test("the acts of the application are found", () => {
  expect(workOf.length).toBeGreaterThan(45);
});

describe("an act", () => {
  test.each(workOf.map(({ name, work }) => [name, work] as const))("%s puts itself on record", (name, work) => {
    const entries = recordsIn(work);
    const always = entries.some((call) => !isConditional(call, work));
    if (always) return;
    expect(Object.keys(NOTHING_TO_RECORD), "record() in every case, or list it here with the reason").toContain(name);
  });
});

test("no exception stands that is no longer needed", () => {
  const names = new Set(workOf.map(({ name }) => name));
  expect(Object.keys(NOTHING_TO_RECORD).filter((name) => !names.has(name))).toEqual([]);
});

test("every kind of act on the list is recorded by some act, and no other", () => {
  const recorded = new Set(
    servers.flatMap(({ tree }) =>
      [...nodesIn(tree)]
        .filter((node) => ts.isPropertyAssignment(node))
        .filter((node) => node.name.getText() === "act")
        .flatMap((node) => [...nodesIn(node.initializer)])
        .filter((node) => ts.isStringLiteral(node))
        .map((node) => node.text),
    ),
  );
  expect(Object.keys(acts).filter((kind) => !recorded.has(kind))).toEqual([]);
  expect([...recorded].filter((kind) => !(kind in acts))).toEqual([]);
});

/** Writes that are no acts of anybody: what the service notes for itself. */
const NOTED: Readonly<Record<string, string>> = {
  updateSeen: "when a session was last used",
  updateLastUsed: "when a key was last used; its first use is an act",
  insertTry: "counts of tries, cleared after their window",
  deleteTries: "counts of tries",
  updateTryTakenBack: "counts of tries",
  insertInvitation: "the link of a letter, made when it is sent; that it was written is an act",
  insertReset: "the link of a letter, likewise",
  insertAddressChange: "the link of a letter, likewise",
  updateSent: "the outbox: that a letter went out",
  updateFailed: "the outbox: what the mail server said",
};

test("whatever else is written, is written in an act", () => {
  const outside = servers
    .filter(({ file }) => !file.endsWith(".queries.server.ts"))
    .flatMap(({ file, tree }) =>
      calls(tree)
        .filter((call) => /^(insert|update|delete|replace)[A-Z]/.test(nameOf(call)))
        .filter((call) => call.arguments.at(-1)?.getText() === "database()")
        .filter((call) => !Object.hasOwn(NOTED, nameOf(call)))
        .map((call) => `${file}: ${functionAround(call)} calls ${nameOf(call)}`),
    );
  expect(outside).toEqual([]);
});
