import { API_BASE } from "#app/http/apiContract.ts";

/** A request that the guide shows: what it is for, and the address under the API's base. A test sends each of them. */
export interface Example {
  id: string;
  says: string;
  /** Under the base, with its query. */
  path: string;
  /** As it is typed; the key stands in the variable TABLEWRIGHT_KEY. */
  command: string;
}

const KEY = 'curl -H "Authorization: Bearer $TABLEWRIGHT_KEY"';

function example(id: string, says: string, publicUrl: string, path: string, options = ""): Example {
  return { id, says, path, command: `${KEY}${options} \\\n  '${publicUrl}${API_BASE}${path}'` };
}

/**
 * The requests of the guide, against this service.
 * @param edition the number they pin
 */
export function examplesFor(publicUrl: string, edition: number): { newest: Example; first: Example; more: Example[] } {
  return {
    newest: example("newest", "Which edition is the newest", publicUrl, "/editions/current"),
    first: example("first", "Water, all its values", publicUrl, `/editions/${edition}/species/H2O(l)`),
    more: [
      example(
        "values",
        "Values of several species, one property",
        publicUrl,
        `/editions/${edition}/values?species=H2O(l),H2O(g)&property=enthalpyOfFormation`,
      ),
      example(
        "ion",
        "An ion; in a query, %2B is the plus sign",
        publicUrl,
        `/editions/${edition}/species?key=Na%2B(aq)`,
      ),
      example("gases", "Gases that hold hydrogen", publicUrl, `/editions/${edition}/species?element=H&phase=g`),
      example("table", "The whole edition as a file", publicUrl, `/editions/${edition}/table.csv`, " -O"),
      example(
        "compare",
        "What changed between an edition and the newest",
        publicUrl,
        `/editions/${edition}/compare/current`,
      ),
    ],
  };
}
