import { apiPaths } from "./api/shape.ts";
import { downloadTableJson } from "./api/contract.ts";
import { jsonFormat } from "./api/tableFormats.ts";
import { tableRoute } from "./api/tableRoute.server.ts";

const api = tableRoute(downloadTableJson, jsonFormat, apiPaths.tableJson);

export const loader = api.loader;
export const action = api.action;
