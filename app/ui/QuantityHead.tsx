import { propertyInfo, type Property } from "#app/thermo/property.ts";
import { Symbol } from "./Symbol.tsx";
import { UnitText } from "./UnitText.tsx";

/** The head of a column of one property, quantity over unit: ΔfH° / kJ mol−1. Figures below it carry no unit. */
export function QuantityHead({ property, withUnit = true }: { property: Property; withUnit?: boolean }) {
  const { symbol, unit, name } = propertyInfo[property];
  return (
    <abbr title={name} className="no-underline">
      <Symbol of={symbol} />
      {withUnit && (
        <span className="font-normal text-soft">
          {" / "}
          <UnitText unit={unit} />
        </span>
      )}
    </abbr>
  );
}
