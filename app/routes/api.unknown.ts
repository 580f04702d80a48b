import { unknownApiRoute } from "#app/http/api.server.ts";

const api = unknownApiRoute();

export const loader = api.loader;
export const action = api.action;
