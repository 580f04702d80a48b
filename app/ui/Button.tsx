import { Link, useNavigation } from "react-router";

/** `main` is the page's one main act, `plain` any other, `quiet` the least, `text` stands in a sentence like a link. */
export type ButtonKind = "main" | "plain" | "quiet" | "text";

const classes: Record<ButtonKind, string> = {
  main: "button button-main",
  plain: "button",
  quiet: "button button-quiet",
  text: "button button-text",
};

interface ButtonProps extends Omit<React.ComponentPropsWithRef<"button">, "className"> {
  kind?: ButtonKind | undefined;
  /** True while its act is on the way (`usePending`): it stays focusable, says so, and a second press does nothing. */
  pending?: boolean | undefined;
  /** What it says while pending, "Sending…". */
  pendingLabel?: string | undefined;
}

/** A button that sends its form. What it says is a verb of the trade: "Accept line", "Publish edition 8". */
export function Button({ kind = "plain", pending = false, pendingLabel, children, onClick, ...rest }: ButtonProps) {
  return (
    <button
      {...rest}
      className={classes[kind]}
      aria-disabled={pending || undefined}
      onClick={(event) => {
        // Disabling would throw the focus away; swallowing the press does not.
        if (pending) event.preventDefault();
        else onClick?.(event);
      }}
    >
      {pending ? (pendingLabel ?? children) : children}
      {pending && <span className="said"> (working)</span>}
    </button>
  );
}

/** A link that looks like a button, for a way on that changes nothing. */
export function ButtonLink({
  kind = "plain",
  to,
  children,
}: {
  kind?: ButtonKind;
  to: string;
  children: React.ReactNode;
}) {
  return (
    <Link className={classes[kind]} to={to}>
      {children}
    </Link>
  );
}

/**
 * Whether a page form is being sent: any, or the one whose submit button has this `name` and `value`. For a fetcher use
 * `fetcher.state !== "idle"`.
 */
export function usePending(name?: string, value?: string): boolean {
  const navigation = useNavigation();
  if (navigation.state === "idle" || !navigation.formData) return false;
  return name === undefined || navigation.formData.get(name) === value;
}
