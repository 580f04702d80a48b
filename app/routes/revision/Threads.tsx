import type { Thread } from "#app/review/threads.ts";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Time } from "#app/ui/Time.tsx";
import { OpenLink, useDesk } from "./desk.tsx";
import { formKey } from "./outcome.ts";
import { ReasonForm } from "./Reason.tsx";

/** One comment with its answers, and the place to answer it. */
export function ThreadView({ thread, anchor, may }: { thread: Thread; anchor: string; may: boolean }) {
  const { open } = useDesk();
  const form = formKey("answer", thread.id);
  return (
    <div className="my-2 border-l-2 border-rule pl-3.5" id={`comment-${thread.id}`}>
      <Said body={thread.body} by={thread.by} at={thread.at}>
        {thread.waits && (
          <span className="ml-3">
            <InlineMark kind="look">no answer yet</InlineMark>
          </span>
        )}
      </Said>
      {thread.answers.map((answer) => (
        <div key={answer.id} className="mt-1 border-l-2 border-rule pl-3.5">
          <Said {...answer} isAnswer />
        </div>
      ))}
      {may &&
        (open === form ? (
          <ReasonForm
            intent="answer"
            subject={thread.id}
            fields={[["comment", thread.id]]}
            name="body"
            label="Answer"
            hint={`${thread.by} gets it by letter.`}
            act="Write the answer"
            pendingLabel="Writing…"
            anchor={anchor}
          />
        ) : (
          <p className="text-fine">
            <OpenLink form={form} anchor={anchor}>
              Answer<span className="said"> what {thread.by} wrote</span>
            </OpenLink>
          </p>
        ))}
    </div>
  );
}

interface SaidProps {
  body: string;
  by: string;
  at: Date;
  isAnswer?: boolean;
  children?: React.ReactNode;
}

function Said({ body, by, at, isAnswer = false, children }: SaidProps) {
  return (
    <blockquote>
      <p className="max-w-[68ch] whitespace-pre-line">{body}</p>
      <footer className="text-fine text-soft">
        {by}
        {isAnswer && " answered"}, <Time at={at} withTime />
        {children}
      </footer>
    </blockquote>
  );
}

/** What was written about the revision as a whole. */
export function RevisionThreads({ threads, may }: { threads: readonly Thread[]; may: boolean }) {
  if (threads.length === 0) return null;
  return (
    <Section head="Comments on the revision" id="comments">
      {threads.map((thread) => (
        <ThreadView key={thread.id} thread={thread} anchor="comments" may={may} />
      ))}
    </Section>
  );
}
