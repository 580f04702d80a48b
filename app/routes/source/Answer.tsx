import { useEffect, useRef } from "react";

/**
 * What the form answers above its fields. It takes the focus when it comes, so that whoever sent the form at its foot
 * sees it and hears it. Give it a key of what it answers, so that a second answer takes the focus again.
 */
export function Answer({ label, children }: { label: string; children: React.ReactNode }) {
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => box.current?.focus(), []);
  return (
    <div ref={box} role="group" tabIndex={-1} aria-label={label}>
      {children}
    </div>
  );
}
