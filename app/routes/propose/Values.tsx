import { Form } from "react-router";
import { valueField } from "#app/review/proposal.ts";
import type { ProposePage } from "#app/review/proposePage.server.ts";
import { type Property, PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Section } from "#app/ui/Section.tsx";
import { ConditionFields, DraftFields, SourceChoice, ValueRow } from "./Fields.tsx";
import { errorList, type FormState, formState } from "./form.ts";
import type { ProposeReply } from "./outcome.ts";

interface FormProps {
  page: ProposePage;
  revision: number | null;
  reply: ProposeReply | undefined;
}

/** Values from one source: the one that the address names, or any of the five. */
export function ValuesForm({ page, revision, reply, property }: FormProps & { property: Property | null }) {
  const form = formState(reply);
  const rowOf = (one: Property) => (
    <ValueRow key={one} form={form} property={one} place={page.places.find((place) => place.property === one)} />
  );
  const others = property === null ? [] : PROPERTIES.filter((one) => one !== property);
  const pending = usePending("intent", "values");
  return (
    <Form method="post" className="max-w-[52rem]">
      <FormErrors {...errorList(reply)} />
      <input type="hidden" name="seen" value={page.species.seen} />
      <Section head={property === null ? "The values" : "The value"}>
        <p className="field-hint mb-3">
          With their digits as the source prints them; −45.94(35) and −45.94 ± 0.35 are read too.
          {property === null && " Leave a row empty where nothing is proposed."}
        </p>
        {PROPERTIES.filter((one) => property === null || one === property).map(rowOf)}
        {others.length > 0 && (
          <details className="disclosure mb-4" open={others.some((one) => isTouched(form, one))}>
            <summary>Other values of it from the same source</summary>
            <div className="mt-3">{others.map(rowOf)}</div>
          </details>
        )}
        <ConditionFields form={form} solute={page.species.phase === "aq"} />
      </Section>
      <Section head="Where it comes from">
        <SourceChoice form={form} sources={page.sources} />
        <DraftFields form={form} drafts={page.drafts} revision={revision} title={titleOf(page.species.key, property)} />
      </Section>
      <Button kind="main" type="submit" name="intent" value="values" pending={pending} pendingLabel="Examining…">
        Propose and examine
      </Button>
    </Form>
  );
}

function isTouched(form: FormState, property: Property): boolean {
  return (["value", "uncertainty"] as const).some(
    (part) =>
      (form.typed(valueField(property, part)) ?? "") !== "" ||
      form.reply?.errors[valueField(property, part)] !== undefined,
  );
}

/** What a new draft is called unless somebody says otherwise. */
function titleOf(key: string, property: Property | null): string {
  if (property === null) return `Values of ${key}`;
  const name = propertyInfo[property].name.replace(/^standard /, "");
  return `${name.charAt(0).toUpperCase()}${name.slice(1)} of ${key}`;
}
