/** How far a long piece of work is, drawn and in words ("301 of 418 read · 9 refused"). The words are announced. */
export function Progress({
  done,
  of,
  label,
  children,
}: {
  done: number;
  of: number;
  label: string;
  children: React.ReactNode;
}) {
  return (
    <div>
      <progress className="progress" value={done} max={Math.max(of, 1)} aria-label={label} />
      <p className="fine" role="status">
        {children}
      </p>
    </div>
  );
}
