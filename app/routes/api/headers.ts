import { z } from "zod";
import type { ApiOperation } from "#app/http/apiContract.ts";

/*
 * The headers of the API's answers, as the contract describes them. What every answer of the service carries (policies for
 * browsers, the date) and what belongs to the connection is left out. Pure.
 */

const described = {
  "X-Request-Id": z.uuid().meta({ description: "Names the request; it stands in the service's log too." }),
  "Cache-Control": z
    .enum(["private, max-age=31536000, immutable", "private, max-age=30, must-revalidate", "private, no-cache"])
    .meta({
      description: "Immutable under the number of an edition, for moments under current, else to be asked again.",
    }),
  ETag: z
    .string()
    .regex(/^"[0-9a-f]{64}"$/)
    .meta({ description: "Strong: the SHA-256 of the bytes of the answer, in hexadecimal." }),
  "Repr-Digest": z
    .string()
    .regex(/^sha-256=:[A-Za-z0-9+/]{43}=:$/)
    .meta({ description: "The same hash as RFC 9530 has it." }),
  "Content-Location": z
    .string()
    .regex(/^\/api\/v1\//)
    .meta({ description: "The numbered address of the same answer, where the word current was used." }),
  Link: z
    .string()
    .regex(/^<[^>]+>; rel="[a-z-]+"/)
    .meta({ description: "Addresses that belong to the answer (RFC 8288): the next page, neighbours, descriptions." }),
  "Content-Disposition": z
    .string()
    .regex(/^attachment; filename="[^"]+"$/)
    .meta({ description: "The name to save the file under." }),
  Vary: z.literal("Accept").meta({ description: "The form of the answer follows the Accept header." }),
  Location: z
    .string()
    .regex(/^\/api\/v1\//)
    .meta({ description: "Where to go: the canonical address, or that of what was made." }),
  "WWW-Authenticate": z
    .string()
    .regex(/^Bearer realm="/)
    .meta({ description: "The scheme by which a key is given." }),
  Allow: z
    .string()
    .regex(/^(?:[A-Z]+, )*OPTIONS$/)
    .meta({ description: "The methods that the address answers." }),
} as const;

const noStore = z.literal("no-store").meta({ description: "Kept by nobody." });
const privateNoStore = z
  .literal("private, no-store")
  .meta({ description: "An answer to what was sent; kept by nobody." });

type Described = Record<string, z.ZodType>;

const take = (...names: (keyof typeof described)[]): Described =>
  Object.fromEntries(names.map((name) => [name, described[name]]));
const perhaps = (...names: (keyof typeof described)[]): Described =>
  Object.fromEntries(names.map((name) => [name, described[name].optional()]));

/** The headers of one operation's answer of one status; optional ones are there where they have something to say. */
export function headersOf(operation: ApiOperation, status: number): z.ZodObject {
  return z.object({ ...take("X-Request-Id"), ...ownHeaders(operation, status) });
}

function ownHeaders({ method, headers = [] }: ApiOperation, status: number): Described {
  if (status === 308) return { ...take("Location"), "Cache-Control": described["Cache-Control"] };
  if (status === 401) return { "Cache-Control": noStore, ...take("WWW-Authenticate") };
  if (status === 405) return { "Cache-Control": noStore, ...take("Allow") };
  if (status >= 400) return { "Cache-Control": noStore };
  if (status === 304) return { ...take("ETag", "Cache-Control"), ...perhaps(...headers) };
  if (method === "get") return { ...take("ETag", "Cache-Control", "Repr-Digest"), ...perhaps(...headers) };
  return {
    "Cache-Control": privateNoStore,
    ...take("Repr-Digest"),
    ...(status === 201 ? take("Location") : {}),
    ...perhaps(...headers),
  };
}
