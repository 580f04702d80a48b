/** One line that is announced when it changes: saved, sent, how many rows a filter leaves. Keep it on the page while empty. */
export function StatusLine({ children, shown = true }: { children?: React.ReactNode; shown?: boolean }) {
  return (
    <p role="status" className={shown ? "fine" : "said"}>
      {children}
    </p>
  );
}
