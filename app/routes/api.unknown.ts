import { unknownApiRoute } from "#app/http/api.server.ts";

export const { loader, action } = unknownApiRoute();
