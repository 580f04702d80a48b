import { Form } from "react-router";
import { typedDetail } from "#app/review/proposal.ts";
import type { ProposePage } from "#app/review/proposePage.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Section } from "#app/ui/Section.tsx";
import { DraftFields, NameFields, Questions, Readings } from "./Fields.tsx";
import { errorList, formState } from "./form.ts";
import type { ProposeReply } from "./outcome.ts";

/** What a species shall be called: printed formula, label, name, numbers, synonyms. */
export function NamesForm({
  page,
  revision,
  reply,
}: {
  page: ProposePage;
  revision: number | null;
  reply: ProposeReply | undefined;
}) {
  const form = formState(reply);
  const stands = typedDetail(page.species.detail);
  const pending = usePending("intent", "names");
  return (
    <Form method="post" className="max-w-[52rem]">
      <FormErrors {...errorList(reply)} />
      <Questions form={form} edition={page.edition} />
      <input type="hidden" name="seen" value={page.species.seen} />
      <Section head="What it shall be called">
        <NameFields form={form} stands={stands} />
        <div className="grid items-start gap-x-6 sm:grid-cols-2">
          <div>
            <Field
              field={form.field("formula", stands["formula"])}
              label="Printed formula"
              hint="The order of its elements may change, the composition may not."
              autoComplete="off"
            />
            <Readings form={form} field="formula" />
          </div>
          <Field
            field={form.field("label", stands["label"], false)}
            label="Form or isomer"
            hint="Part of the key; an older key leads on to the new one."
            autoComplete="off"
          />
        </div>
      </Section>
      <Section head="Why">
        <DraftFields
          form={form}
          drafts={page.drafts}
          revision={revision}
          title={`What ${page.species.key} is called`}
        />
      </Section>
      <Button kind="main" type="submit" name="intent" value="names" pending={pending} pendingLabel="Examining…">
        Propose and examine
      </Button>
    </Form>
  );
}
