import { describe, expect, test } from "vitest";
import { BadRequest, TooLarge, UnsupportedMedia } from "./errors.ts";
import { readForm, readJson } from "./forms.server.ts";

const at = "http://localhost/page";

function post(body: BodyInit, type?: string): Request {
  return new Request(at, { method: "POST", body, ...(type ? { headers: { "Content-Type": type } } : {}) });
}

describe("readForm", () => {
  test("reads the fields of both kinds of form", async () => {
    const multipart = new FormData();
    multipart.set("name", "Wörter");
    expect((await readForm(post(multipart))).get("name")).toBe("Wörter");
    expect((await readForm(post(new URLSearchParams({ name: "a b" })))).get("name")).toBe("a b");
  });

  test.each([
    ["JSON", post("{}", "application/json"), UnsupportedMedia],
    ["plain text", post("a=b", "text/plain"), UnsupportedMedia],
    ["a body without a type", new Request(at, { method: "POST", body: new Uint8Array([1]) }), UnsupportedMedia],
    ["multipart without a boundary", post("x", "multipart/form-data"), BadRequest],
    [
      "multipart broken off",
      post("--b\r\nContent-Disposition: form-data; na", "multipart/form-data; boundary=b"),
      BadRequest,
    ],
    ["NUL in a field", post(new URLSearchParams({ name: "a\0b" })), BadRequest],
    ["more than 1 MB", post(new URLSearchParams({ name: "x".repeat(1024 * 1024) })), TooLarge],
  ])("refuses %s", async (_what, request, kind) => {
    await expect(readForm(request)).rejects.toBeInstanceOf(kind);
  });

  test("refuses a file", async () => {
    const form = new FormData();
    form.set("sheet", new File(["a,b"], "sheet.csv"));
    await expect(readForm(post(form))).rejects.toBeInstanceOf(BadRequest);
  });
});

describe("readJson", () => {
  test("reads a body", async () => {
    expect(await readJson(post('{"species":["H2O(l)"]}', "application/json; charset=utf-8"))).toEqual({
      species: ["H2O(l)"],
    });
  });

  test.each([
    ["another type", post("{}", "text/plain"), UnsupportedMedia],
    ["a broken body", post("{", "application/json"), BadRequest],
    ["bytes that are not UTF-8", post(new Uint8Array([0x22, 0xff, 0x22]), "application/json"), BadRequest],
    ["NUL in a text", post('"\\u0000"', "application/json"), BadRequest],
    ["nesting without end", post("[".repeat(200_000), "application/json"), BadRequest],
  ])("refuses %s", async (_what, request, kind) => {
    await expect(readJson(request)).rejects.toBeInstanceOf(kind);
  });
});
