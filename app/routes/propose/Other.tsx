import { Form } from "react-router";
import type { ProposePage } from "#app/review/proposePage.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Section } from "#app/ui/Section.tsx";
import { DraftFields, IdentityFields, NameFields, Questions, TakenValues } from "./Fields.tsx";
import { errorList, formState } from "./form.ts";
import type { ProposeReply } from "./outcome.ts";

/** Values that belong to another species: withdrawn here and set there, in one revision. */
export function OtherForm({
  page,
  revision,
  reply,
}: {
  page: ProposePage;
  revision: number | null;
  reply: ProposeReply | undefined;
}) {
  const form = formState(reply);
  const { detail } = page.species;
  const pending = usePending("intent", "other");
  return (
    <Form method="post" className="max-w-[52rem]">
      <FormErrors {...errorList(reply)} />
      <Questions form={form} edition={page.edition} />
      <input type="hidden" name="seen" value={page.species.seen} />
      <Section head="Which values">
        <p className="field-hint mb-3">
          A wrong formula or phase is another species. The values ticked here are withdrawn from {page.species.key} and
          proposed for the species below, digit by digit and with their source, in one revision.
        </p>
        <TakenValues form={form} places={page.places} ticked />
      </Section>
      <Section head="The species they belong to">
        <IdentityFields form={form} />
        <details
          className="disclosure mb-4"
          open={["name", "cas", "inchikey", "synonyms"].some((name) => reply?.errors[name])}
        >
          <summary>What it is called, where it is new to the table</summary>
          <div className="mt-3">
            <NameFields form={form} stands={{ name: detail.name, cas: detail.cas ?? "" }} />
          </div>
        </details>
      </Section>
      <Section head="Why">
        <DraftFields
          form={form}
          drafts={page.drafts}
          revision={revision}
          title={`Values of ${page.species.key} belong to another species`}
        />
      </Section>
      <Button kind="main" type="submit" name="intent" value="other" pending={pending} pendingLabel="Examining…">
        Propose the move
      </Button>
    </Form>
  );
}
