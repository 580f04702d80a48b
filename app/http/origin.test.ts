import { describe, expect, test } from "vitest";
import { isForeign } from "./origin.server.ts";

const HOME = "https://tables.calderpoint.example";

function request(method: string, path: string, headers: Record<string, string> = {}): Request {
  return new Request(`${HOME}${path}`, { method, headers });
}

describe("isForeign", () => {
  test.each([
    ["our own origin", { Origin: HOME, "Sec-Fetch-Site": "same-origin" }, false],
    ["typed by the person", { "Sec-Fetch-Site": "none" }, false],
    ["a program without either header", {}, false],
    ["another origin", { Origin: "https://elsewhere.example" }, true],
    ["our host over plain http", { Origin: "http://tables.calderpoint.example" }, true],
    ["our host on another port", { Origin: `${HOME}:8443` }, true],
    ["an opaque origin", { Origin: "null" }, true],
    ["a sister host", { "Sec-Fetch-Site": "same-site", Origin: HOME }, true],
    ["another site without Origin", { "Sec-Fetch-Site": "cross-site" }, true],
  ])("a POST from %s", (_from, headers, foreign) => {
    expect(isForeign(request("POST", "/resources/repair", headers), HOME)).toBe(foreign);
  });

  test.each(["GET", "HEAD"])("a %s changes nothing and is let through from anywhere", (method) => {
    expect(isForeign(request(method, "/", { Origin: "https://elsewhere.example" }), HOME)).toBe(false);
  });

  test.each([
    ["/api/v1/sheets", false],
    ["/apiary", true],
  ])("POST %s from another origin", (path, foreign) => {
    expect(isForeign(request("POST", path, { Origin: "https://elsewhere.example" }), HOME)).toBe(foreign);
  });
});
