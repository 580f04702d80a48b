import type { z } from "zod";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import type { TableFormat } from "#app/editions/tableFile.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import type { ApiOperation } from "#app/http/apiContract.ts";
import { requireKey } from "#app/people/apiKey.server.ts";
import { keepingOf, tableFileAnswer } from "./answer.server.ts";

/**
 * The address of a whole edition in one form.
 * @param numbered the address under an edition's number
 * @param linked further headers of its answer
 */
export function tableRoute(
  operation: ApiOperation<z.ZodObject>,
  format: TableFormat,
  numbered: (edition: number) => string,
  linked: (edition: number) => Record<string, string> = () => ({}),
) {
  return apiRoute(
    answering(operation, async ({ request, params }) => {
      await requireKey(request, "read");
      const resolved = await resolveEdition(params["edition"]);
      const { edition } = resolved;
      const { keeping, headers } = keepingOf(resolved, numbered(edition.number));
      return tableFileAnswer(request, edition, keeping, { ...linked(edition.number), ...headers }, format);
    }),
  );
}
