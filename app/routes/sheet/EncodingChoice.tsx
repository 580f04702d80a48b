import { Form } from "react-router";
import { ENCODINGS } from "#app/intake/encodings.ts";
import type { SheetPage } from "#app/intake/sheetPage.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { InlineSelect } from "#app/ui/Field.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Fine } from "#app/ui/Section.tsx";
import { SheetText } from "./SheetText.tsx";

/**
 * In which encoding the bytes were read. Where they do not prove it, it says why it was taken and shows the signs by
 * which a person sees whether it is right; either way another one can be tried.
 */
export function EncodingChoice({ page: { sheet } }: { page: SheetPage }) {
  const { dialect } = sheet;
  const pending = usePending("intent", "encoding");
  if (!dialect) return null;
  const { guessed } = dialect;
  const form = (
    <Form method="post" className="mt-1.5">
      Read it as{" "}
      <InlineSelect
        name="encoding"
        label="Encoding"
        options={ENCODINGS.map((one) => [one, one] as const)}
        defaultValue={dialect.encoding}
      />{" "}
      <Button kind="text" name="intent" value="encoding" pending={pending}>
        Read the bytes again
      </Button>
    </Form>
  );
  if (!guessed) {
    return (
      <details className="disclosure mb-4">
        <summary>
          read as {dialect.encoding}
          {dialect.byteOrderMark && ", as its byte order mark says"}
        </summary>
        {form}
      </details>
    );
  }
  return (
    <div className="mb-6">
      <Note kind="look" word="encoding">
        <p>
          Read as {dialect.encoding}: {guessed.why}. Nothing in the bytes proves it; the signs of the sheet show whether
          it is right.
        </p>
        {guessed.signs.length > 0 && (
          <Fine>
            {guessed.signs.map(({ sign, row }, index) => (
              <span key={sign} className="mr-3 whitespace-nowrap">
                <b className="text-ink">
                  <SheetText text={sign} />
                </b>{" "}
                row {row}
                {index < guessed.signs.length - 1 && ","}
              </span>
            ))}
          </Fine>
        )}
        {form}
      </Note>
    </div>
  );
}
