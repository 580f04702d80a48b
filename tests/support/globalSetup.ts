import type { TestProject } from "vitest/node";
import { ensureCluster, removeCluster, temporaryClusterFolder } from "../../scripts/cluster.mjs";
import { migrate } from "../../scripts/database.mjs";

declare module "vitest" {
  interface ProvidedContext {
    /** The tests' own cluster; the database named in `ownerUrl` is migrated and serves as the template of every clone. */
    cluster: { superUrl: string; ownerUrl: string; appUrl: string };
  }
}

/**
 * One PostgreSQL cluster for the whole run, in a folder of its own, with one migrated template database. A DATABASE_URL
 * in the environment is never looked at: a test must not reach somebody's table.
 */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  delete process.env["DATABASE_URL"];
  delete process.env["DATABASE_OWNER_URL"];
  const folder = temporaryClusterFolder();
  try {
    const { superUrl, ownerUrl, appUrl } = await ensureCluster({ folder, throwaway: true });
    await migrate(ownerUrl);
    project.provide("cluster", { superUrl, ownerUrl, appUrl });
  } catch (error) {
    await removeCluster(folder);
    throw error;
  }
  return () => removeCluster(folder);
}
