import { Form } from "react-router";
import type { ProposePage } from "#app/review/proposePage.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Section } from "#app/ui/Section.tsx";
import { DraftFields, TakenValues } from "./Fields.tsx";
import { errorList, formState } from "./form.ts";
import type { ProposeReply } from "./outcome.ts";

/** Takes values of a species out of the table: one, several or all. */
export function WithdrawalForm({
  page,
  revision,
  reply,
}: {
  page: ProposePage;
  revision: number | null;
  reply: ProposeReply | undefined;
}) {
  const form = formState(reply);
  const pending = usePending("intent", "withdrawal");
  return (
    <Form method="post" className="max-w-[52rem]">
      <FormErrors {...errorList(reply)} />
      <input type="hidden" name="seen" value={page.species.seen} />
      <Section head="What goes out">
        <p className="field-hint mb-3">
          It goes out with the next edition; the editions before it keep it. A species without values keeps its name, so
          that links to it lead somewhere.
        </p>
        <TakenValues form={form} places={page.places} ticked={false} />
      </Section>
      <Section head="Why">
        <DraftFields
          form={form}
          drafts={page.drafts}
          revision={revision}
          title={`Withdrawal of values of ${page.species.key}`}
        />
      </Section>
      <Button kind="main" type="submit" name="intent" value="withdrawal" pending={pending} pendingLabel="Examining…">
        Propose the withdrawal
      </Button>
    </Form>
  );
}
