import { describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { makePerson, PASSWORD } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

const HOST = "tables.calderpoint.example";
const HOME = `https://${HOST}`;

const server = useServer({
  env: { PUBLIC_URL: HOME, TRUSTED_PROXIES: "127.0.0.1" },
  prepare: async ({ app }) => {
    makeApplicationUse(app);
    await makePerson("Vera Lindqvist", "analyst");
  },
});

/** What a proxy that ends TLS sends on: the service's own name and how the client reached it. */
const viaProxy = { "X-Forwarded-Host": HOST, "X-Forwarded-Proto": "https", "X-Forwarded-For": "192.0.2.7" };

const form = (password: string): RequestInit => ({
  method: "POST",
  headers: { ...viaProxy, Origin: HOME, "Sec-Fetch-Site": "same-origin" },
  body: new URLSearchParams({ email: "vera.lindqvist@calderpoint.example", password }),
});

describe("behind a proxy that ends TLS", () => {
  test("a form is taken, and its cookie is bound to this host over https", async () => {
    const answer = await server.fetch("/sign-in", form(PASSWORD));
    expect(answer.status).toBe(302);
    const cookie = answer.headers.get("set-cookie") ?? "";
    expect(cookie).toMatch(/^__Host-/);
    expect(cookie).toMatch(/;\s*Secure/i);
    expect(cookie).not.toMatch(/;\s*Domain/i);
  });

  test("a form with a wrong password is answered by the page, not refused at the door", async () => {
    const answer = await server.fetch("/sign-in", form("not the password"));
    expect(answer.status).toBe(401);
    expect(await answer.text()).toContain("</html>");
  });

  test("the same form from another site is refused", async () => {
    const sent = form(PASSWORD);
    const answer = await server.fetch("/sign-in", {
      ...sent,
      headers: { ...viaProxy, Origin: "https://elsewhere.example" },
    });
    expect(answer.status).toBe(403);
  });

  test("browsers are told to keep to https", async () => {
    for (const where of ["/sign-in", "/no/such/page", "/assets/none.js", "/api/v1/editions"]) {
      const { headers } = await server.fetch(where, { headers: viaProxy });
      expect([where, headers.get("strict-transport-security")]).toEqual([where, "max-age=31536000; includeSubDomains"]);
    }
  });

  test("a problem's address is made from PUBLIC_URL", async () => {
    const answer = await server.fetch("/api/v1/editions", { headers: viaProxy });
    expect(await answer.json()).toMatchObject({ status: 401, type: `${HOME}/problems/unauthenticated` });
  });

  test("a page asked for over plain http is sent on, a program is refused", async () => {
    const plain = { ...viaProxy, "X-Forwarded-Proto": "http" };
    const page = await server.fetch("/sign-in?to=%2Frevisions", { headers: plain });
    expect([page.status, page.headers.get("location")]).toEqual([308, `${HOME}/sign-in?to=%2Frevisions`]);
    expect((await server.fetch("/api/v1/editions", { headers: plain })).status).toBe(400);
  });

  test("another host is refused, whichever header names it", async () => {
    expect((await server.fetch("/sign-in", { headers: { ...viaProxy, "X-Forwarded-Host": "a.example" } })).status).toBe(
      400,
    );
    expect((await server.fetch("/sign-in")).status).toBe(400);
  });

  test("the log tells the client's address, not the proxy's", async () => {
    await server.fetch("/conventions", { headers: viaProxy });
    await expect.poll(() => server.log()).toContain('"address":"192.0.2.7"');
  });
});
