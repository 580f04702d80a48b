import { apiPaths } from "./api/shape.ts";
import { downloadTableLines } from "./api/contract.ts";
import { linesFormat } from "./api/tableFormats.ts";
import { tableRoute } from "./api/tableRoute.server.ts";

const api = tableRoute(downloadTableLines, linesFormat, apiPaths.tableLines);

export const loader = api.loader;
export const action = api.action;
