import { database } from "#app/db/database.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { shortCitation } from "#app/sources/citation.ts";
import { atomicWeight } from "#app/thermo/atomicWeights.ts";
import { showNumber } from "#app/thermo/notation.ts";
import { PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import {
  type DetailAsOf,
  type Edition,
  findDetailHistory,
  findDetailsAsOf,
  findValueHistory,
  findWithdrawals,
} from "./editions.queries.server.ts";
import { followingGibbsEnergy } from "./follows.ts";
import { findFrame } from "./frame.server.ts";
import { identityOf, molarMass } from "./identity.ts";
import { findSources, findSpeciesWithValues } from "./read.server.ts";
import { aboveTranslation, closureOf, drawnClosure, historyPoints, speciesHistory } from "./speciesPage.ts";
import { findElementEntropies } from "./tablePage.server.ts";

/** Everything a species' page shows of it as of an edition. */
export async function findSpeciesPage(acting: Acting, edition: Edition, detail: DetailAsOf) {
  demand(acting, "table:read");
  const n = edition.number;
  const db = database();
  const { speciesId } = detail;
  const { species } = await findSpeciesWithValues(n, [detail]);
  const values = species[0]?.values ?? [];
  const history = await findValueHistory(n, speciesId, db);
  const withdrawals = await findWithdrawals(n, speciesId, db);
  const details = await findDetailHistory(n, speciesId, db);
  const alike = await findDetailsAsOf(n, { hill: [detail.hill] }, db);
  const elementEntropy = await findElementEntropies(n);
  const sources = await findSources(
    n,
    [...values, ...history].map((value) => value.sourceId),
  );
  const identity = identityOf(detail);
  const mass = molarMass(detail.composition, atomicWeight);

  const standing = (property: string) => values.find((value) => value.property === property);
  const enthalpy = standing("enthalpyOfFormation");
  const entropy = standing("entropy");
  const above = entropy ? aboveTranslation(identity, entropy.digits, mass) : null;
  const closure = closureOf(identity, values, elementEntropy);
  const follows =
    enthalpy && entropy && !standing("gibbsEnergyOfFormation")
      ? followingGibbsEnergy(identity, enthalpy, entropy, elementEntropy)
      : null;
  return {
    frame: await findFrame(edition),
    species: {
      speciesId,
      key: detail.key,
      printed: detail.printed,
      name: detail.name,
      cas: detail.cas,
      synonyms: detail.synonyms,
      phase: detail.phase,
      /** The edition in which it came in; a species stays once it is there, whatever becomes of its values. */
      since: Math.min(detail.since, ...details.map((one) => one.since)),
      molarMass: mass === null ? null : showNumber(mass, 3),
    },
    values: PROPERTIES.flatMap((property) => {
      const value = standing(property);
      if (!value) return [];
      const { digits, uncertainty, givenText, givenUnit, givenNote, remark, method, basis, origin, since } = value;
      const differs = givenNote !== null || givenUnit !== propertyInfo[property].unit;
      return [
        {
          property,
          digits,
          uncertainty,
          given: differs ? { text: givenText, unit: givenUnit, note: givenNote } : null,
          remark,
          method,
          basis,
          origin,
          since,
          sourceId: value.sourceId,
        },
      ];
    }),
    follows,
    sources: [...sources.values()].map(({ sourceId, citation, notice, doi }) => ({
      sourceId,
      short: shortCitation(citation) || sourceId,
      notice,
      doi,
    })),
    closure: closure ? drawnClosure(closure) : null,
    closureNotMade: closure?.verdict === "notMade" ? closure.sentence : null,
    aboveTranslation: above === null ? null : showNumber(above, 1),
    also: alike
      .filter((other) => other.speciesId !== speciesId && other.charge === detail.charge)
      .map((other) => ({ key: other.key, name: other.name, sameSubstance: isSameSubstance(detail, other) })),
    plots: PROPERTIES.flatMap((property) => {
      const points = historyPoints(history, property);
      return points ? [{ property, points }] : [];
    }),
    history: speciesHistory(history, withdrawals, details),
  };
}

export type SpeciesPage = Awaited<ReturnType<typeof findSpeciesPage>>;

/** Whether two species of one formula are phases of one substance: by CAS number where both have one, else by name. */
function isSameSubstance(one: DetailAsOf, other: DetailAsOf): boolean {
  if (one.cas && other.cas) return one.cas === other.cas;
  if (one.name && other.name) return one.name.toLowerCase() === other.name.toLowerCase();
  return one.printed === other.printed;
}
