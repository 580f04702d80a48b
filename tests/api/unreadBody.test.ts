import { Agent, request } from "node:http";
import { expect, test } from "vitest";
import { useServer } from "#tests/support/server.ts";

/*
 * A program keeps its connection open from one request to the next. What it sends too much must not stand in the way of its
 * next request.
 */

const server = useServer();

function send(agent: Agent, method: string, path: string, body: Buffer): Promise<{ status: number; port: number }> {
  return new Promise((resolve, reject) => {
    const sent = request(
      `${server.url}${path}`,
      { agent, method, headers: { "Content-Type": "application/json", "Content-Length": body.length } },
      (answer) => {
        const port = answer.socket.localPort ?? 0;
        answer.resume().on("end", () => resolve({ status: answer.statusCode ?? 0, port }));
      },
    );
    sent.on("error", reject);
    sent.end(body);
  });
}

test("a body that was refused unread does not hold up the next request on its connection", async () => {
  const agent = new Agent({ keepAlive: true, maxSockets: 1 });
  const large = Buffer.alloc(3_000_000, "x");
  const first = await send(agent, "POST", "/api/v1/editions/1/lookup", large);
  const second = await send(agent, "POST", "/sheets/new", large);
  const third = await send(agent, "GET", "/api/v1/openapi.json", Buffer.alloc(0));
  agent.destroy();
  expect([first.status, second.status, third.status]).toEqual([401, 401, 200]);
  expect(new Set([first.port, second.port, third.port]).size).toBe(1);
});
