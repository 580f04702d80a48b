import { shortCitation } from "#app/sources/citation.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import type { LineContent } from "./content.ts";

/** What a line says, in a few words: "−45.94 kJ/mol", "its withdrawal", "NH3(g), ammonia". */
export function lineSays(content: LineContent, property: Property | null): string {
  switch (content.kind) {
    case "value":
      return `${showDigits(content.digits)} ${property ? propertyInfo[property].unit : ""}`.trim();
    case "withdrawal":
      return "its withdrawal";
    case "detail":
      return [content.key, content.name].filter((part) => part !== "").join(", ");
    case "source":
      return shortCitation(content.citation);
  }
}
