import { request } from "node:http";
import { expect, test } from "vitest";
import { startServer, unexpectedErrors } from "#tests/support/server.ts";

test("asked to stop, the service finishes the request it is reading, takes no new one, and ends in good order", async () => {
  const server = await startServer({ worker: true });
  const body = new URLSearchParams({ email: "nobody@calderpoint.example", password: "not the password" }).toString();
  const answered = new Promise<number>((resolve, reject) => {
    const slow = request(`${server.url}/sign-in`, {
      method: "POST",
      headers: { "Content-Type": "application/x-www-form-urlencoded", "Content-Length": Buffer.byteLength(body) },
    });
    slow.on("response", (response) => {
      response.resume();
      resolve(response.statusCode ?? 0);
    });
    slow.on("error", reject);
    slow.write(body.slice(0, 10));
    setTimeout(() => slow.end(body.slice(10)), 1_500);
  });
  // Let the first half of the request arrive, then ask the processes to stop.
  await new Promise((resolve) => setTimeout(resolve, 300));
  const stopped = server.stop();
  await new Promise((resolve) => setTimeout(resolve, 400));

  await expect(server.fetch("/healthz")).rejects.toThrow();
  expect(await answered).toBe(401);
  expect(await stopped).toEqual([0, 0]);
  expect(unexpectedErrors(server.log())).toEqual([]);
});
