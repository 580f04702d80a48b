import { useRef, useState } from "react";
import { Form, useNavigation } from "react-router";
import { paths } from "#app/paths.ts";
import { Button } from "#app/ui/Button.tsx";
import { FieldFrame } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";

/** Brings a sheet by picker, or by dropping it on the frame; works without scripts by the picker. */
export function UploadForm({ wrong }: { wrong?: string | undefined }) {
  const navigation = useNavigation();
  const pending = navigation.state !== "idle" && navigation.formAction === paths.newSheet();
  const picker = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  const field = plainField("sheet", { errors: wrong ? [wrong] : [] });
  return (
    <Form method="post" action={paths.newSheet()} encType="multipart/form-data" className="max-w-[44rem]">
      <FormErrors fields={[[field, "Sheet"]]} />
      <div
        className={`border border-dashed p-5 ${over ? "border-verdigris bg-verdigris-wash" : "border-soft"}`}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={(event) => {
          event.preventDefault();
          setOver(false);
          const input = picker.current;
          if (!input || event.dataTransfer.files.length === 0) return;
          input.files = event.dataTransfer.files;
          if (event.dataTransfer.files.length === 1) input.form?.requestSubmit();
        }}
      >
        <FieldFrame
          field={field}
          label="Sheet"
          hint="Choose the file, or drop it here. A table in plain text (CSV), at most 10 MB."
        >
          <input
            ref={picker}
            id={field.id}
            name={field.name}
            type="file"
            className="max-w-full file:mr-3 file:border file:border-solid file:border-ink file:bg-transparent file:px-3 file:py-1 file:font-medium file:text-ink"
            accept=".csv,.tsv,.txt,text/csv,text/tab-separated-values,text/plain"
            required
            aria-describedby={wrong ? `${field.descriptionId} ${field.errorId}` : field.descriptionId}
            aria-invalid={wrong ? true : undefined}
          />
        </FieldFrame>
        <div className="mt-4">
          <Button kind="main" pending={pending} pendingLabel="Receiving…">
            Send the sheet
          </Button>
        </div>
      </div>
    </Form>
  );
}
