/**
 * Lines to be typed or sent as they stand: a command, an answer. Long lines break on the page and copy whole; a line's end
 * is only where the text has one.
 */
export function Shell({ label, children }: { label: string; children: string }) {
  return (
    <pre
      aria-label={label}
      role="group"
      className="my-3 max-w-[76ch] border-l border-rule py-1 pl-4 font-sans text-body break-words whitespace-pre-wrap text-pencil"
    >
      {children}
    </pre>
  );
}
