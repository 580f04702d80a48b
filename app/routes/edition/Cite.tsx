import { Lede, Section } from "#app/ui/Section.tsx";

/** A citation ready to be copied, and the same for citation programs. */
export function Cite({ cite: { text, record } }: { cite: { text: string; record: string } }) {
  return (
    <Section head="Cite this edition" id="cite">
      <Lede>
        Its number, its address and its digest together say which numbers were read; none of them ever changes.
      </Lede>
      <blockquote className="max-w-[68ch] border-l border-rule pl-4 break-words select-all">{text}</blockquote>
      <details className="disclosure mt-3" id="citation-record">
        <summary>for a citation program (CSL-JSON)</summary>
        <pre className="mt-2 max-w-[68ch] overflow-x-auto border-l border-rule pl-4 font-sans text-fine break-all whitespace-pre-wrap">
          {record}
        </pre>
      </details>
    </Section>
  );
}
