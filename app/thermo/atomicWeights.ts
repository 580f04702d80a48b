import { elementsAndIsotopes } from "chemical-elements";

/**
 * Standard atomic weights in g/mol: terrestrial abundances times isotope masses, from the `chemical-elements` package
 * (isotope data of NIST). They agree with the IUPAC abridged values to the digits those have. D and T are isotope
 * masses. Elements without a stable isotope have none.
 */
const ATOMIC_WEIGHTS: ReadonlyMap<string, number> = new Map(
  elementsAndIsotopes.flatMap(({ symbol, mass, isotopes }) => {
    const weights: [string, number][] = mass ? [[symbol, mass]] : [];
    if (symbol === "H") {
      for (const [own, nucleons] of [
        ["D", 2],
        ["T", 3],
      ] as const) {
        const isotope = isotopes.find(({ nominal }) => nominal === nucleons);
        if (isotope !== undefined) weights.push([own, isotope.mass]);
      }
    }
    return weights;
  }),
);

/** Standard atomic weight in g/mol; undefined for an element without one (technetium, polonium, …). */
export function atomicWeight(element: string): number | undefined {
  return ATOMIC_WEIGHTS.get(element);
}
