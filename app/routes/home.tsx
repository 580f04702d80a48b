import { Link } from "react-router";
import { findRecordPage } from "#app/audit/recordPage.server.ts";
import { findEditionHome } from "#app/editions/homePage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { findOwnUnfinishedSheets } from "#app/intake/sheetPage.server.ts";
import { paths } from "#app/paths.ts";
import { findOwnKeys } from "#app/people/apiKey.server.ts";
import { findPeople } from "#app/people/people.server.ts";
import { may, type Permission } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findVisitor, requestIdOf } from "#app/people/visitor.server.ts";
import { findLately, findReviewHome } from "#app/review/homePage.server.ts";
import { Caution } from "#app/ui/Caution.tsx";
import { Ribbon } from "#app/ui/EditionLine.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/home";
import { EditionSection } from "./home/EditionSection.tsx";
import { FirstSteps } from "./home/FirstSteps.tsx";
import { Lately } from "./home/Lately.tsx";
import { PeopleSection, RecordSection } from "./home/Office.tsx";
import { OwnRevisions, OwnSheets } from "./home/OwnWork.tsx";
import { NextEdition, ToDecide } from "./home/ReviewWork.tsx";
import { Stranger } from "./home/Stranger.tsx";
import { changesInWords, dayInWords, sheetNeed, waitingInWords, waitingSentence } from "./home/words.ts";

export const meta: Route.MetaFunction = () => [{ title: "Home · Tablewright" }];

/** Entries of the record that an administrator sees here. */
const RECORD_SHOWN = 5;

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const visitor = await findVisitor(request);
  if (!visitor) return null;
  const { sessionId: _sessionId, ...person } = visitor;
  const acting: Acting = { person, apiKeyId: null, requestId: requestIdOf(request) };
  const now = new Date();
  const allowed = (permission: Permission): boolean => may(person.roles, permission);
  const [edition, review, lately, sheets, keys, people, record] = await Promise.all([
    allowed("table:read") ? findEditionHome(acting) : null,
    allowed("revision:read") ? findReviewHome(acting, now) : null,
    allowed("revision:read") ? findLately(acting) : [],
    allowed("sheet:work") ? findOwnUnfinishedSheets(acting) : null,
    allowed("key:own") ? findOwnKeys(acting) : [],
    allowed("people:manage") ? findPeople(acting) : null,
    allowed("record:read") ? findRecordPage(acting, {}) : null,
  ]);
  const decides = allowed("revision:decide");
  const own = review?.own ?? [];
  const inState = (state: string): number => own.filter((revision) => revision.state === state).length;
  const needs = (sheets ?? []).map((sheet) => ({ ...sheet, need: sheetNeed(sheet) }));
  return {
    hasRole: person.roles.length > 0,
    works: decides || sheets !== null,
    sentence: waitingSentence(
      {
        toDecide: decides ? (review?.toDecide ?? []).map((revision) => revision.sentAt ?? revision.madeAt) : null,
        own: sheets && {
          sheets: needs.filter((sheet) => sheet.need !== null).length,
          returned: inState("returned"),
          drafts: inState("draft"),
        },
      },
      now,
    ),
    toDecide: decides
      ? (review?.toDecide ?? []).map((revision) => ({
          ...revision,
          waits: waitingInWords(revision.sentAt ?? revision.madeAt, now),
        }))
      : null,
    own:
      sheets && own.map((revision) => ({ ...revision, when: dayInWords(revision.newest?.at ?? revision.madeAt, now) })),
    sheets: sheets && needs,
    next: review?.next ?? null,
    edition: edition && { ...edition, words: changesInWords(edition) },
    lately: lately.map((entry) => ({ ...entry, day: dayInWords(entry.at, now) })),
    mayBring: allowed("sheet:work"),
    keysInUse: keys.filter((key) => !key.withdrawnAt && key.endsAt > now).length,
    people: people && {
      inUse: people.filter((one) => one.state === "in use").length,
      invited: people.filter((one) => one.state === "invited").length,
      switchedOff: people.filter((one) => one.state === "switched off").length,
    },
    record:
      record &&
      record.entries.slice(0, RECORD_SHOWN).map(({ number, at, act, person: who, objectKind, objectId }) => ({
        number,
        at,
        act,
        who,
        objectKind,
        objectId,
      })),
  };
});

/** What the first page knows for somebody who is signed in. */
export type Home = NonNullable<Route.ComponentProps["loaderData"]>;

export default function HomePage({ loaderData: home }: Route.ComponentProps) {
  if (!home) return <Stranger />;
  const { edition } = home;
  return (
    <Leaf
      heading={home.works ? "What waits for you" : "The table today"}
      lede={home.sentence || undefined}
      ribbon={edition ? <EditionRibbon edition={edition} /> : undefined}
    >
      {!home.hasRole && (
        <EmptyPage>
          You have an account and no role yet, so nothing of the table is open to you. An administrator of the
          laboratory gives roles.
        </EmptyPage>
      )}
      {home.toDecide && <ToDecide revisions={home.toDecide} />}
      {home.sheets && <OwnSheets sheets={home.sheets} alone={home.own?.length === 0} />}
      {home.own && <OwnRevisions revisions={home.own} next={home.next?.number ?? (edition?.number ?? 0) + 1} />}
      {home.next && home.works && <NextEdition next={home.next} />}
      {home.people && <PeopleSection people={home.people} />}
      {home.record && <RecordSection entries={home.record} />}
      {edition ? (
        <EditionSection edition={edition} keysInUse={home.keysInUse} />
      ) : (
        home.hasRole && <FirstSteps mayBring={home.mayBring} />
      )}
      {home.lately.length > 0 && <Lately entries={home.lately} />}
      {edition && edition.changes.length > 0 && <Caution />}
    </Leaf>
  );
}

function EditionRibbon({ edition }: { edition: NonNullable<Home["edition"]> }) {
  const { number, previous, publishedAt, valueCount, speciesCount, words } = edition;
  return (
    <Ribbon
      end={
        previous === null ? (
          <span>the first of this table</span>
        ) : (
          <span>
            {words} · <Link to={paths.compare(previous, number)}>compare with edition {previous}</Link>
          </span>
        )
      }
    >
      <span>
        <b>Edition {number}</b> stands since <Time at={publishedAt} />
      </span>
      <span>
        {count(valueCount)} values of {count(speciesCount)} species
      </span>
    </Ribbon>
  );
}
