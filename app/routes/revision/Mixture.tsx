import { Button } from "#app/ui/Button.tsx";
import { TextArea } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { Note } from "#app/ui/Note.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { ActForm, type Asked, useFocusOnOpen } from "./desk.tsx";

/**
 * What the checks find in the mixture that a decision would leave, with the decision once more: what blocks needs a reason,
 * what asks to be looked at a press.
 */
export function Mixture({ asked, dismiss }: { asked: Asked; dismiss: () => void }) {
  const { question, intent, sentence } = asked;
  const field = useFocusOnOpen<HTMLTextAreaElement>();
  const confirm = useFocusOnOpen<HTMLButtonElement>();
  const declines = intent === "decline";
  return (
    <div role="alert" className="max-h-[60vh] basis-full overflow-y-auto" id="mixture">
      <Note kind={question.needsReason ? "block" : "look"} word="part of a set">
        <p>
          {declines
            ? "What stays accepted of this species would be a mixture of new and standing values."
            : "Only part of what is proposed for this species would be accepted, beside values that stand."}{" "}
          The checks find in it:
        </p>
        {question.findings.map((finding) => (
          <div key={finding.fingerprint} className="mt-1">
            <p>
              <b>
                <Prose text={`${finding.species}, ${finding.title}`} />
              </b>
              {": "}
              <Prose text={finding.sentence} />
            </p>
            {finding.arithmetic.map((line) => (
              <p key={line} className="text-fine text-soft">
                <Prose text={line} />
              </p>
            ))}
          </div>
        ))}
      </Note>
      <ActForm
        intent={intent}
        subject="mixture"
        line={asked.about}
        fields={[...question.fields.filter(([name]) => name !== "intent"), ["mixture", question.token]]}
        className="my-2 max-w-[46rem]"
      >
        {({ pending }) => (
          <>
            {question.needsReason && (
              <TextArea
                ref={field}
                rows={2}
                label="Why this may stand all the same"
                hint="What blocks is set aside with this reason; it stays on record. Leave it and decide the lines of the species together."
                field={plainField("mixtureReason", {
                  id: "mixture-reason",
                  errors: sentence === "Say why what blocks is set aside." ? [sentence] : undefined,
                  required: true,
                })}
              />
            )}
            <div className="flex flex-wrap items-baseline gap-x-4 gap-y-2">
              <Button
                ref={question.needsReason ? undefined : confirm}
                type="submit"
                pending={pending}
                pendingLabel={declines ? "Declining…" : "Accepting…"}
              >
                {declines ? "Decline all the same" : "Accept all the same"}
              </Button>
              <Button kind="text" type="button" onClick={dismiss}>
                Never mind
              </Button>
            </div>
          </>
        )}
      </ActForm>
    </div>
  );
}
