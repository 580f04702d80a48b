/** What would stand here, and how to start. `children` is a sentence or two; `start` a link or button. */
export function EmptyPage({ children, start }: { children: React.ReactNode; start?: React.ReactNode }) {
  return (
    <div className="my-6 max-w-[60ch] border-y border-rule py-6 text-soft">
      <div>{children}</div>
      {start && <div className="mt-4">{start}</div>}
    </div>
  );
}
