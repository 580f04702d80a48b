import { useId } from "react";

/** A part of a page under its own head. */
export function Section({
  head,
  id,
  children,
}: {
  head: React.ReactNode;
  id?: string | undefined;
  children: React.ReactNode;
}) {
  const own = useId();
  return (
    <section aria-labelledby={id ?? own}>
      <h2 className="section-head" id={id ?? own}>
        {head}
      </h2>
      {children}
    </section>
  );
}

/** A softly printed paragraph of ordinary width: what the page or the part below is about. */
export function Lede({ children }: { children: React.ReactNode }) {
  return <p className="lede">{children}</p>;
}

/** Small print under a table or a drawing. */
export function Fine({ children }: { children: React.ReactNode }) {
  return <p className="fine mt-3">{children}</p>;
}

/** Parts side by side where there is room, one under the other where there is not. */
export function Columns({ children }: { children: React.ReactNode }) {
  return <div className="columns">{children}</div>;
}
