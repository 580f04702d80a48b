import type { RevisionPage } from "#app/review/revisionPage.ts";
import { paths } from "#app/paths.ts";
import { Button, ButtonLink } from "#app/ui/Button.tsx";
import { DecisionBar, KeysHint } from "#app/ui/DecisionBar.tsx";
import { Field } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { count } from "#app/ui/figure.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { StatusLine } from "#app/ui/StatusLine.tsx";
import { ActForm, OpenLink, useDesk, useFocusOnOpen, useLineKeys } from "./desk.tsx";
import { Mixture } from "./Mixture.tsx";
import { ReasonForm } from "./Reason.tsx";

const DECIDING_KEYS = [
  ["j", "next"],
  ["k", "back"],
  ["a", "accept"],
  ["d", "decline"],
  ["c", "comment"],
] as const;
const WRITING_KEYS = [
  ["j", "next"],
  ["k", "back"],
  ["c", "comment"],
] as const;

/** What can be done with the whole revision, always within reach; what was refused and what was done is said here. */
export function Bar({ page, digest, asksPassword }: { page: RevisionPage; digest: string; asksPassword: boolean }) {
  const { said, refusal, asked, dismiss, open, started } = useDesk();
  const keys = useLineKeys();
  const { may } = page;
  const panel = panelOf(page, open, started);
  const acts = may.decide || may.send || may.withdraw;
  if (!acts) return <StatusLine shown={false}>{said}</StatusLine>;
  return (
    <div id="decide" className="contents">
      <DecisionBar
        end={
          <>
            <Counts page={page} />
            {page.groups.length > 0 && (
              <span className="keys-hint ml-3 text-fine">
                {keys.on && <KeysHint keys={may.decide ? DECIDING_KEYS : WRITING_KEYS} />}
                <Button kind="text" type="button" onClick={keys.toggle}>
                  <span className="text-fine">{keys.on ? "keys off" : "keys on"}</span>
                </Button>
              </span>
            )}
          </>
        }
      >
        {refusal && (
          <div role="alert" className="flex basis-full flex-wrap items-baseline gap-x-4">
            <Note kind="block" word="refused">
              <p>
                <Prose text={refusal} />
              </p>
            </Note>
            <Button kind="text" type="button" onClick={dismiss}>
              Close this
            </Button>
          </div>
        )}
        {asked ? (
          <Mixture key={asked.question.token} asked={asked} dismiss={dismiss} />
        ) : (
          (panel ?? (
            <>
              {may.decide && <Deciding page={page} digest={digest} asksPassword={asksPassword} />}
              {!may.decide && may.write && <Writing page={page} />}
              {may.withdraw && (
                <OpenLink form="withdraw" anchor="decide" className="button button-quiet">
                  Withdraw
                </OpenLink>
              )}
            </>
          ))
        )}
        <StatusLine>{said}</StatusLine>
      </DecisionBar>
    </div>
  );
}

function Counts({ page: { counts } }: { page: RevisionPage }) {
  return (
    <span className="inline-flex flex-wrap gap-x-3">
      {counts.blocks > 0 && <InlineMark kind="block">{count(counts.blocks)} block</InlineMark>}
      {counts.looks > 0 && <InlineMark kind="look">{count(counts.looks)} to look at</InlineMark>}
      {counts.overtaken > 0 && <InlineMark kind="look">{count(counts.overtaken)} overtaken</InlineMark>}
      <InlineMark kind="clean">{count(counts.clean)} clean</InlineMark>
    </span>
  );
}

function Deciding({ page, digest, asksPassword }: { page: RevisionPage; digest: string; asksPassword: boolean }) {
  const { cleanSet, may } = page;
  return (
    <>
      {cleanSet.count > 0 && (
        <ActForm intent="accept-clean" fields={[["digest", digest]]}>
          {({ pending }) => (
            <Button kind="main" type="submit" pending={pending} pendingLabel="Accepting…">
              {cleanSet.count === 1 ? "Accept the clean line" : `Accept the ${count(cleanSet.count)} clean lines`}
            </Button>
          )}
        </ActForm>
      )}
      {may.close &&
        (asksPassword ? (
          <OpenLink form="close" anchor="decide" className="button button-main">
            {closeWords(page)}
          </OpenLink>
        ) : (
          <ActForm intent="close">
            {({ pending }) => (
              <Button kind="main" type="submit" pending={pending} pendingLabel="Closing…">
                {closeWords(page)}
              </Button>
            )}
          </ActForm>
        ))}
      <OpenLink form="return" anchor="decide" className="button">
        <span>
          Return<span className="max-sm:sr-only"> with comments</span>
        </span>
      </OpenLink>
    </>
  );
}

function closeWords({ counts }: RevisionPage): string {
  return counts.accepted === 0
    ? "Close the review: nothing accepted"
    : `Close the review: ${count(counts.accepted)} accepted, ${count(counts.declined)} declined`;
}

/** Closing signs the review off; when the sign-in is old, the password is asked for once more. */
function CloseForm({ page }: { page: RevisionPage }) {
  const field = useFocusOnOpen<HTMLInputElement>();
  return (
    <ActForm intent="close" className="my-2 max-w-[46rem]">
      {({ pending, errors }) => {
        const password = plainField("password", {
          id: "close-password",
          errors: errors["password"] ? [...errors["password"]] : undefined,
          required: true,
        });
        return (
          <>
            <FormErrors fields={[[password, "Your password"]]} />
            <Field
              ref={field}
              field={password}
              label="Your password"
              hint="You sign with it that you reviewed these lines. You signed in a while ago, so it is asked for once more."
              type="password"
              autoComplete="current-password"
            />
            <div className="-mt-2 flex flex-wrap items-baseline gap-x-4 gap-y-2">
              <Button kind="main" type="submit" pending={pending} pendingLabel="Closing…">
                {closeWords(page)}
              </Button>
              <OpenLink form="close" anchor="decide">
                Never mind
              </OpenLink>
            </div>
          </>
        );
      }}
    </ActForm>
  );
}

function Writing({ page: { may, counts, revision } }: { page: RevisionPage }) {
  return (
    <>
      {may.restate && (
        <ActForm intent="restate">
          {({ pending }) => (
            <Button type="submit" pending={pending} pendingLabel="Restating…">
              {counts.overtaken === 1
                ? "Restate the overtaken line"
                : `Restate the ${count(counts.overtaken)} overtaken lines`}
            </Button>
          )}
        </ActForm>
      )}
      {may.send && (
        <OpenLink form="send" anchor="decide" className="button button-main">
          Send to review
        </OpenLink>
      )}
      {may.write && (
        <ButtonLink kind="quiet" to={paths.takeOver(revision.id)}>
          Take over another draft
        </ButtonLink>
      )}
    </>
  );
}

/** The form of the bar that is open. */
function panelOf(page: RevisionPage, open: string | null, started: string): React.ReactNode {
  const { may, counts } = page;
  if (open === "close" && may.close) return <CloseForm page={page} />;
  if (open === "return" && may.decide) {
    return (
      <ReasonForm
        key={started}
        intent="return"
        name="remark"
        label="What should be mended"
        hint="The steward gets it by letter. Decisions made so far stay; a line that is edited is decided anew."
        act="Return with comments"
        pendingLabel="Returning…"
        anchor="decide"
      />
    );
  }
  if (open === "send" && may.send) {
    return (
      <ReasonForm
        intent="send"
        name="remark"
        label="Remark for the reviewers"
        hint="What to look at first; what was answered."
        optional
        act="Send to review"
        pendingLabel="Sending…"
        kind="main"
        anchor="decide"
      >
        {page.unanswered.length > 0 && (
          <p className="mb-2">
            <InlineMark kind="look">
              {page.unanswered.length === 1
                ? "One comment has no answer yet"
                : `${page.unanswered.length} comments have no answer yet`}
            </InlineMark>
            : the reviewers see that. Answer beside the line, or say it here.
          </p>
        )}
        {counts.blocks > 0 && (
          <p className="mb-2 text-fine text-soft">
            {counts.blocks === 1 ? "One finding blocks" : `${counts.blocks} findings block`}: a reviewer can only accept
            those lines after setting the finding aside.
          </p>
        )}
      </ReasonForm>
    );
  }
  if (open === "withdraw" && may.withdraw) {
    return (
      <ReasonForm
        intent="withdraw"
        name="reason"
        label="Why it is withdrawn"
        act={`Withdraw revision ${page.revision.id}`}
        pendingLabel="Withdrawing…"
        anchor="decide"
      >
        <p className="mb-2 max-w-[60ch]">
          {counts.lines === 1 ? "Its one line falls" : `Its ${count(counts.lines)} lines fall`} with it, and decisions
          on them count no more. Nothing is erased: the revision stays to be read. A withdrawn revision is not taken up
          again.
        </p>
      </ReasonForm>
    );
  }
  return null;
}
