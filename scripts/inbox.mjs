// A mail server on loopback that keeps every letter as a file instead of sending it: the demo's inbox.
import { randomBytes } from "node:crypto";
import { createWriteStream, mkdirSync, renameSync } from "node:fs";
import path from "node:path";
import { pipeline } from "node:stream/promises";

/**
 * Starts the inbox on a free port of loopback. Each letter becomes `<time>-<random>.eml` in `folder`, complete from the
 * moment it has that name.
 * @param {string} folder
 * @returns {Promise<{ url: string, close(): Promise<void> }>} `url` is what SMTP_URL takes
 */
export async function startInbox(folder) {
  const { SMTPServer } = await import("smtp-server");
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["AUTH", "STARTTLS"],
    onData(stream, _session, callback) {
      const name = `${new Date().toISOString().replaceAll(":", "-")}-${randomBytes(4).toString("hex")}`;
      const arriving = path.join(folder, `${name}.part`);
      pipeline(stream, createWriteStream(arriving, { mode: 0o600 }))
        .then(() => renameSync(arriving, path.join(folder, `${name}.eml`)))
        .then(() => callback(), callback);
    },
  });
  // A sender that breaks off is no concern of ours.
  server.on("error", () => undefined);
  await new Promise((resolve, reject) => {
    server.server.once("error", reject);
    server.listen(0, "127.0.0.1", resolve);
  });
  const { port } = server.server.address();
  return { url: `smtp://127.0.0.1:${port}`, close: () => new Promise((resolve) => server.close(resolve)) };
}
