import { Form } from "react-router";
import type { ProposeChoices } from "#app/review/proposePage.server.ts";
import { PROPERTIES } from "#app/thermo/property.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Section } from "#app/ui/Section.tsx";
import {
  ConditionFields,
  DraftFields,
  IdentityFields,
  NameFields,
  Questions,
  SourceChoice,
  ValueRow,
} from "./Fields.tsx";
import { errorList, formState } from "./form.ts";
import type { ProposeReply } from "./outcome.ts";

/** A species that the table does not have, with as many of its values as are known. */
export function NewSpeciesForm({
  page,
  revision,
  reply,
}: {
  page: ProposeChoices;
  revision: number | null;
  reply: ProposeReply | undefined;
}) {
  const form = formState(reply);
  const pending = usePending("intent", "species");
  return (
    <Form method="post" className="max-w-[52rem]">
      <FormErrors {...errorList(reply)} />
      <Questions form={form} edition={page.edition} />
      <Section head="The species">
        <IdentityFields form={form} />
        <NameFields form={form} stands={{}} />
      </Section>
      <Section head="Its values">
        <p className="field-hint mb-3">
          As many as the source gives, with their digits; −45.94(35) and −45.94 ± 0.35 are read too. They may also come
          later.
        </p>
        {PROPERTIES.map((property) => (
          <ValueRow key={property} form={form} property={property} />
        ))}
        <ConditionFields form={form} solute />
        <SourceChoice form={form} sources={page.sources} />
      </Section>
      <Section head="Why">
        <DraftFields form={form} drafts={page.drafts} revision={revision} title="A new species" />
      </Section>
      <Button kind="main" type="submit" name="intent" value="species" pending={pending} pendingLabel="Examining…">
        Propose and examine
      </Button>
    </Form>
  );
}
