import { useEffect, useRef, useState } from "react";
import { useLocation } from "react-router";

/**
 * After a change of page in the browser: the new title is announced and the focus moves to the page's head, as a full load
 * would do. A change of filter or sorting alone (same path) leaves the focus where it is.
 */
export function Announcer() {
  const { pathname, hash } = useLocation();
  const [title, setTitle] = useState("");
  const previous = useRef(pathname);
  useEffect(() => {
    if (previous.current === pathname) return;
    previous.current = pathname;
    if (hash !== "") return;
    const head = document.querySelector<HTMLElement>("main h1");
    // An error summary or a field that asked for the focus keeps it.
    const taken = document.activeElement?.closest(".error-summary, input, textarea, select");
    if (!taken) head?.focus({ preventScroll: true });
    setTitle(document.title);
  }, [pathname, hash]);
  return (
    <p className="said" aria-live="polite" aria-atomic="true">
      {title}
    </p>
  );
}
