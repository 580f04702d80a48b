// npm start: from a clean checkout to a running service.
//
// Without DATABASE_URL it runs the demo on a database of its own; with it, nothing is seeded and no account exists until
// `npm run admin` makes the first.
import { createServer } from "node:net";
import { ensureBuild } from "./build.mjs";
import { announce, claim, release } from "./claim.mjs";
import { ensureDemo, migrate } from "./database.mjs";
import { checkSettings, importTypeScript, openEnvironment, publicUrlOf } from "./environment.mjs";
import { startInbox } from "./inbox.mjs";
import { startProgram, stopRequest } from "./processes.mjs";
import { setup } from "./setup.mjs";
import { main, say, sleep, Stop } from "./terminal.mjs";

const FIRST_PORT = 3000;
const PORTS_TRIED = 50;
/** The exit code with which the web process says that its port is taken. */
const PORT_TAKEN = 98;

/** Listens on a port; gives what lets go of it again, or the code of the error. */
function hold(port, host) {
  return new Promise((resolve) => {
    const server = createServer((connection) => connection.destroy());
    server.once("error", ({ code }) => resolve({ code }));
    server.listen(port, host, () => resolve({ port, letGo: () => new Promise((done) => server.close(done)) }));
  });
}

/**
 * The port asked for, or the first free one from 3000 on. It is held until the web process takes it, so that another
 * clone that starts meanwhile chooses another one.
 */
async function holdPort(host) {
  const { PORT } = process.env;
  const ports = PORT ? [Number(PORT)] : Array.from({ length: PORTS_TRIED }, (_, index) => FIRST_PORT + index);
  for (const port of ports) {
    const held = await hold(port, host);
    if (held.letGo) return held;
    if (["EADDRNOTAVAIL", "ENOTFOUND", "EAI_AGAIN"].includes(held.code)) {
      throw new Stop("HOST does not name an address of this machine.");
    }
    if (PORT && held.code === "EACCES") {
      throw new Stop("PORT may not be used by this user; set it to a port above 1023.");
    }
  }
  throw new Stop(
    PORT
      ? "PORT is taken by another program; set it to a free port, or leave it unset to take the next free one."
      : `None of the ports ${FIRST_PORT} to ${FIRST_PORT + PORTS_TRIED - 1} is free; set PORT to one that is.`,
  );
}

async function waitUntilHealthy(host, port) {
  const wildcard = { "0.0.0.0": "127.0.0.1", "::": "[::1]" }[host];
  const name = wildcard ?? (host.includes(":") ? `[${host}]` : host);
  for (let tries = 0; tries < 100; tries++) {
    const healthy = await fetch(`http://${name}:${port}/healthz`).then(
      (answer) => answer.ok,
      () => false,
    );
    if (healthy) return;
    await sleep(100);
  }
  throw new Stop("The web process started but does not answer at /healthz.");
}

/** The demo's people, from the same file as the seeds make them from. */
async function demoAccounts() {
  const { demoPeople, DEMO_PASSWORD } = await importTypeScript("app/people/demoPeople.ts");
  const people = Object.values(demoPeople);
  const widest = Math.max(...people.map((person) => person.email.length));
  const lines = people.map((person) => `  ${person.email.padEnd(widest)}  ${person.roles.join(", ")}`);
  return `${lines.join("\n")}\nThe password of each is: ${DEMO_PASSWORD}`;
}

await main(async () => {
  const stopping = stopRequest();
  const begun = Date.now();
  await setup({ database: !process.env.DATABASE_URL });
  await checkSettings();
  if (!claim()) return;

  const host = process.env.HOST || "127.0.0.1";
  // What was started, to be ended in the reverse order whatever happens.
  const undo = [release];
  try {
    let held = await holdPort(host);
    undo.push(() => held.letGo());
    let programs = [];
    let ending = false;
    const stopPrograms = () => Promise.all(programs.map((program) => program.stop()));
    const publicUrlGiven = process.env.PUBLIC_URL;
    const { demo, env, superUrl, ownerUrl, appUrl, close } = await openEnvironment();
    undo.push(close);
    if (ownerUrl) await migrate(ownerUrl);
    if (demo) await ensureDemo({ superUrl, ownerUrl, appUrl }, env);
    await ensureBuild();
    if (demo && !env.SMTP_URL) {
      const inbox = await startInbox(env.TABLEWRIGHT_MAIL_FOLDER);
      undo.push(inbox.close);
      env.SMTP_URL = inbox.url;
    }
    env.HOST = host;
    undo.push(stopPrograms, () => (ending = true));

    let giveUp;
    const gaveUp = new Promise((_resolve, reject) => (giveUp = (sentence) => reject(new Stop(sentence))));
    gaveUp.catch(() => undefined);
    const begin = async () => {
      const { port } = held;
      env.PORT = String(port);
      env.PUBLIC_URL = publicUrlGiven || (await publicUrlOf({ ...env, PUBLIC_URL: undefined }));
      await held.letGo();
      if (ending) return;
      programs = ["web", "worker"].map((name) => startProgram(name, env, giveUp));
      await Promise.all(programs.map((program) => program.ready));
      await waitUntilHealthy(host, port);
    };
    const up = begin().catch(async (error) => {
      // In the moment between letting go of the port and taking it, somebody else took it.
      if (error.code !== PORT_TAKEN || process.env.PORT) throw error;
      await stopPrograms();
      held = await holdPort(host);
      await begin();
    });
    up.catch(() => undefined);
    const early = await Promise.race([up, stopping, gaveUp]);
    if (early === undefined) {
      announce(env.PUBLIC_URL);
      const seconds = ((Date.now() - begun) / 1000).toFixed(1);
      say(`\nTablewright is running at ${env.PUBLIC_URL} (started in ${seconds} s). Ctrl-C stops it.`);
      if (demo) {
        say("This is the demo: DATABASE_URL is not set, so it keeps its own database on this machine.");
        if (!["127.0.0.1", "::1", "localhost"].includes(host)) {
          say("HOST lets other machines in, and the passwords below are known to everybody who has this program.");
        }
        say(`Sign in as one of these people of the fictional Calder Point Laboratory:\n${await demoAccounts()}`);
        if (!process.env.SMTP_URL) say(`Letters are not sent; read them at ${env.PUBLIC_URL}/inbox`);
      } else {
        say(
          "It uses the database that DATABASE_URL names. The first administrator is made with: npm run admin -- --email ADDRESS --name NAME",
        );
        if (!process.env.SMTP_URL) say("SMTP_URL is not set: letters wait in the database and are not sent.");
      }
      say("");
      await Promise.race([stopping, gaveUp]);
      say("Stopping …");
    }
  } finally {
    for (const step of undo.reverse()) await step();
  }
});
