import { describe, expect, test } from "vitest";
import { type Head, isForeign, refusalOf } from "./front.ts";

const HOME = "https://tables.calderpoint.example";
const head = (part: Partial<Head>): Head => ({
  method: "GET",
  target: "/",
  host: "tables.calderpoint.example",
  plainHttp: false,
  ...part,
});

describe("refusalOf", () => {
  test.each([
    "/",
    "/editions/3/species/H2O(l)?x=a+b%20c",
    "/api/v1/editions",
    "/editions/1/species/CdSO4%C2%B78%2F3H2O(cr)",
    "/a//b",
  ])("lets %s in", (target) => {
    expect(refusalOf(head({ target }), HOME)).toBeUndefined();
  });

  test.each([
    ["two slashes in front", "//"],
    ["a host behind two slashes", "//elsewhere.example/"],
    ["the absolute form", "http://elsewhere.example/"],
    ["the asterisk form", "*"],
    ["a backslash", "/\\elsewhere.example"],
    ["an escape broken off", "/a%"],
    ["an escape that is not hexadecimal", "/a%zz"],
    ["an escape that is not UTF-8", "/a%ff"],
    ["NUL in the path", "/a%00"],
    ["a bad escape in the query", "/?q=%e0%a4"],
    ["NUL in the query", "/?q=%00"],
  ])("refuses %s with 400", (_what, target) => {
    expect(refusalOf(head({ target }), HOME)).toMatchObject({ status: 400 });
  });

  test.each([
    [undefined],
    [""],
    ["elsewhere.example"],
    ["tables.calderpoint.example:8443"],
    ["127.0.0.1:3000"],
    ["a b"],
  ])("refuses the host %s with 400", (host) => {
    expect(refusalOf(head({ host }), HOME)).toMatchObject({ status: 400 });
  });

  test("takes the host in any case", () => {
    expect(refusalOf(head({ host: "Tables.CalderPoint.example" }), HOME)).toBeUndefined();
  });

  test("answers a health check under any host", () => {
    expect(refusalOf(head({ target: "/healthz", host: "10.0.0.7" }), HOME)).toBeUndefined();
  });

  test.each(["TRACE", "CONNECT", "PROPFIND", "get"])("refuses the method %s with 405 and a list", (method) => {
    expect(refusalOf(head({ method }), HOME)).toMatchObject({
      status: 405,
      headers: { Allow: expect.stringContaining("GET") },
    });
  });

  describe("over plain http, as a trusted proxy says", () => {
    test("sends a page on to https", () => {
      expect(refusalOf(head({ target: "/editions?a=b", plainHttp: true }), HOME)).toMatchObject({
        status: 308,
        headers: { Location: `${HOME}/editions?a=b` },
      });
    });

    test("refuses a program and a form, and does not send them on", () => {
      expect(refusalOf(head({ target: "/api/v1/editions", plainHttp: true }), HOME)).toMatchObject({ status: 400 });
      expect(refusalOf(head({ method: "POST", plainHttp: true }), HOME)).toMatchObject({ status: 400 });
    });
  });
});

describe("isForeign", () => {
  test.each([
    ["our own origin", { origin: HOME, fetchSite: "same-origin" }, false],
    ["typed by the person", { fetchSite: "none" }, false],
    ["a program without either header", {}, false],
    ["another origin", { origin: "https://elsewhere.example" }, true],
    ["our host over plain http", { origin: "http://tables.calderpoint.example" }, true],
    ["our host on another port", { origin: `${HOME}:8443` }, true],
    ["an opaque origin", { origin: "null" }, true],
    ["a sister host", { fetchSite: "same-site", origin: HOME }, true],
    ["another site without Origin", { fetchSite: "cross-site" }, true],
  ])("a POST from %s", (_from, sent, foreign) => {
    const post = head({ method: "POST", target: "/resources/repair", ...sent });
    expect(isForeign(post, HOME)).toBe(foreign);
    expect(refusalOf(post, HOME)?.status).toBe(foreign ? 403 : undefined);
  });

  test.each(["GET", "HEAD"])("a %s changes nothing and is let through from anywhere", (method) => {
    expect(isForeign(head({ method, origin: "https://elsewhere.example" }), HOME)).toBe(false);
  });

  test.each([
    ["/api/v1/sheets", false],
    ["/apiary", true],
    // The guide for programs is a page.
    ["/api", true],
    ["/api?to=x", true],
  ])("POST %s from another origin", (target, foreign) => {
    expect(isForeign(head({ method: "POST", target, origin: "https://elsewhere.example" }), HOME)).toBe(foreign);
  });
});
