/** The bar at the foot of the window with what can be decided; `end` holds counts and keys. */
export function DecisionBar({
  children,
  end,
  label = "Decide",
}: {
  children: React.ReactNode;
  end?: React.ReactNode;
  label?: string;
}) {
  return (
    <section className="decision-bar" aria-label={label}>
      {children}
      {end && <span className="decision-end">{end}</span>}
    </section>
  );
}

/** The keys that do the same, shown where there is a keyboard: pairs of key and what it does. */
export function KeysHint({ keys }: { keys: readonly (readonly [string, string])[] }) {
  return (
    <span className="keys-hint">
      {keys.map(([key, does]) => (
        <span key={key} className="mr-1.5 whitespace-nowrap">
          <kbd>{key}</kbd> {does}
        </span>
      ))}
    </span>
  );
}
