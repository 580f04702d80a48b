import { apiPaths } from "./api/shape.ts";
import { downloadTable } from "./api/contract.ts";
import { tableRoute } from "./api/tableRoute.server.ts";
import { csvFormat } from "#app/editions/tableFile.ts";

const api = tableRoute(downloadTable, csvFormat, apiPaths.table, (edition) => ({
  Link: `<${apiPaths.tableDescription(edition)}>; rel="describedby"; type="application/csvm+json"`,
}));

export const loader = api.loader;
export const action = api.action;
