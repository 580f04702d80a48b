import { createContext, useCallback, useContext, useEffect, useMemo, useRef, useState } from "react";
import { Link, useFetcher, useRevalidator, useSearchParams } from "react-router";
import { paths } from "#app/paths.ts";
import type { Show } from "#app/review/revisionPage.ts";
import { formKey, type Outcome, sentForm } from "./outcome.ts";

/*
 * What the pieces of a revision's page share: which form is open, what was said last, what was refused, and where the
 * focus goes when a decision takes the button away that was just pressed. Without scripts the same forms post to the page
 * itself, and `?open=` opens a form.
 */

interface Desk {
  revision: number;
  /** Where forms post without scripts: this page, at the same lines. */
  action: string;
  /** Where they post with scripts. */
  resource: string;
  /** Key of the open form. */
  open: string | null;
  show(key: string | null, text?: string): void;
  /** Text that an opened form starts with. */
  started: string;
  /** What the last form without scripts came to. */
  answered: Outcome | undefined;
  hear(outcome: Outcome, about: string): void;
  said: string;
  refusal: string;
  /** What the checks ask before a decision that leaves a mixture is made. */
  asked: Asked | null;
  dismiss(): void;
}

/** A question with the form it came back to. */
export interface Asked {
  question: NonNullable<(Outcome & { ok: false })["asks"]>;
  intent: string;
  sentence: string;
  /** Id of the line near which the focus stays. */
  about: string;
}

function askedBy(outcome: Outcome | undefined, about: string): Asked | null {
  if (!outcome || outcome.ok || !outcome.asks) return null;
  return { question: outcome.asks, intent: outcome.intent, sentence: outcome.sentence, about };
}

/** The address of a page of lines. */
export function linesAddress(revision: number, page: number, show: Show): string {
  const query = new URLSearchParams();
  if (show !== "all") query.set("show", show);
  if (page > 1) query.set("page", String(page));
  return `${paths.revision(revision)}${query.size > 0 ? `?${query.toString()}` : ""}`;
}

const DeskContext = createContext<Desk | null>(null);

export function useDesk(): Desk {
  const desk = useContext(DeskContext);
  if (!desk) throw new Error("This piece stands on the page of a revision only.");
  return desk;
}

/** Acts after which the next undecided line is looked at. */
const MOVES_ON = ["accept", "decline"];

interface DeskProps {
  revision: number;
  /** What the loader read; a new one means that the lines on the page are new. */
  content: object;
  page: number;
  show: Show;
  answered: Outcome | undefined;
  children: React.ReactNode;
}

export function DeskProvider({ revision, content, page, show: chosen, answered, children }: DeskProps) {
  const [search] = useSearchParams();
  const { revalidate } = useRevalidator();
  const failed = answered && !answered.ok ? answered : undefined;
  const [open, setOpen] = useState<string | null>(() => (failed ? sentForm(failed) : search.get("open")));
  const [started, setStarted] = useState("");
  const [said, setSaid] = useState("");
  const [refusal, setRefusal] = useState("");
  const [asked, setAsked] = useState<Asked | null>(() =>
    askedBy(answered, failed?.typed["seen"]?.split(":", 1)[0] ?? ""),
  );
  const focusAfter = useRef<string | null>(null);

  const show = useCallback((key: string | null, text = "") => {
    setOpen(key);
    setStarted(text);
    setRefusal("");
    setAsked(null);
  }, []);
  const hear = useCallback(
    (outcome: Outcome, about: string) => {
      if (outcome.ok) {
        setSaid(outcome.said);
        setRefusal("");
        setAsked(null);
        setOpen(null);
        focusAfter.current = MOVES_ON.includes(outcome.intent) ? `next:${about}` : `stay:${about}`;
        return;
      }
      setSaid("");
      const question = askedBy(outcome, about);
      setAsked(question);
      if (question) {
        setOpen(null);
        setRefusal("");
        return;
      }
      setRefusal(outcome.sentence);
      // Something moved under the page: show what is true now.
      if (outcome.status === 409) void revalidate();
    },
    [revalidate],
  );

  useEffect(() => {
    const wanted = focusAfter.current;
    focusAfter.current = null;
    if (wanted === null) return;
    const [how, about = ""] = wanted.split(":");
    placeFocus(about, how === "next");
  }, [content]);

  const desk = useMemo<Desk>(
    () => ({
      revision,
      action: linesAddress(revision, page, chosen),
      resource: paths.resource(`revisions/${revision}/act`),
      open,
      show,
      started,
      answered,
      hear,
      said,
      refusal,
      asked,
      dismiss: () => {
        setRefusal("");
        setAsked(null);
      },
    }),
    [revision, page, chosen, open, show, started, answered, hear, said, refusal, asked],
  );
  return <DeskContext value={desk}>{children}</DeskContext>;
}

/** Puts the focus on the line just dealt with or the next undecided one, unless the person has moved it elsewhere. */
function placeFocus(lineId: string, next: boolean): void {
  const line = document.getElementById(`line-${lineId}`);
  const active = document.activeElement;
  const left = active && active !== document.body && !isWithin(active, lineId) && !active.closest(".decision-bar");
  if (left) return;
  const rows = lineRows();
  const isOpen = (row: HTMLElement): boolean => row.dataset["open"] === "yes";
  if (!line) {
    if (active && active !== document.body) return;
    const there = rows.find(isOpen) ?? document.querySelector<HTMLElement>(".decision-bar :is(button, a)");
    (there ?? document.querySelector<HTMLElement>("main h1"))?.focus();
    return;
  }
  const from = rows.indexOf(line);
  const open = next ? [...rows.slice(from + 1), ...rows.slice(0, from)].find(isOpen) : undefined;
  (open ?? line).focus();
}

function isWithin(element: Element, lineId: string): boolean {
  const row = element.closest<HTMLElement>("[data-line]");
  return row?.dataset["line"] === lineId;
}

/** The rows of lines on the page, in their order. */
function lineRows(): HTMLElement[] {
  return [...document.querySelectorAll<HTMLElement>("tr[data-row]")];
}

interface ActFormProps {
  intent: string;
  /** What the form is about: id of a line, a finding or a group. Empty for the revision. */
  subject?: string;
  /** Id of the line near which the focus stays; the subject unless said. */
  line?: string;
  /** Hidden fields. */
  fields?: readonly (readonly [string, string | number])[];
  className?: string | undefined;
  children: (state: FormState) => React.ReactNode;
}

/** What the inside of a form needs to know. */
export interface FormState {
  pending: boolean;
  errors: Readonly<Record<string, readonly string[]>>;
  typed: Readonly<Record<string, string>>;
}

/** A form of this page: posts to the page without scripts and in the background with them. */
export function ActForm({ intent, subject = "", line = subject, fields = [], className, children }: ActFormProps) {
  const { revision, action, resource, hear, answered } = useDesk();
  const key = formKey(intent, subject);
  const fetcher = useFetcher<Outcome>({ key: `revision-${revision}-${key}` });
  const { data } = fetcher;
  useEffect(() => {
    if (data) hear(data, line);
  }, [data, hear, line]);
  const failed =
    data && !data.ok ? data : !data && answered && !answered.ok && sentForm(answered) === key ? answered : undefined;
  const pending = fetcher.state !== "idle";
  return (
    <form
      method="post"
      action={action}
      className={className}
      data-intent={intent}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        if (!pending) void fetcher.submit(event.currentTarget, { method: "post", action: resource });
      }}
    >
      <input type="hidden" name="intent" value={intent} />
      {fields.map(([name, value]) => (
        <input key={`${name} ${value}`} type="hidden" name={name} value={value} />
      ))}
      {children({ pending, errors: failed?.errors ?? {}, typed: failed?.typed ?? {} })}
    </form>
  );
}

/** Opens or closes a form. Without scripts it leads to the same page with the form open. */
export function OpenLink({
  form,
  anchor,
  text,
  className,
  children,
}: {
  /** Key of the form. */
  form: string;
  /** Id of the element near which it opens. */
  anchor: string;
  /** What the opened form starts with. */
  text?: string | undefined;
  className?: string | undefined;
  children: React.ReactNode;
}) {
  const { open, show, action } = useDesk();
  const isOpen = open === form;
  const query = isOpen ? "" : `${action.includes("?") ? "&" : "?"}open=${form}`;
  return (
    <Link
      to={`${action}${query}#${anchor}`}
      className={className}
      data-opens={form}
      onClick={(event) => {
        event.preventDefault();
        show(isOpen ? null : form, text);
      }}
    >
      {children}
    </Link>
  );
}

const KEYS_SETTING = "tablewright.keys";

/** Single keys for the lines: on unless switched off, never while a field has the focus, and never with Ctrl, Alt or Meta. */
export function useLineKeys(): { on: boolean; toggle(): void } {
  const { show } = useDesk();
  const [on, setOn] = useState(true);
  useEffect(() => {
    setOn(localStorage.getItem(KEYS_SETTING) !== "off");
  }, []);
  useEffect(() => {
    if (!on) return;
    const listen = (event: KeyboardEvent): void => {
      if (event.ctrlKey || event.metaKey || event.altKey || event.defaultPrevented) return;
      const target = event.target instanceof Element ? event.target : null;
      if (target?.closest("input, textarea, select, [contenteditable]")) return;
      if (actOnKey(event.key, show)) event.preventDefault();
    };
    document.addEventListener("keydown", listen);
    return () => document.removeEventListener("keydown", listen);
  }, [on, show]);
  return {
    on,
    toggle: () => {
      localStorage.setItem(KEYS_SETTING, on ? "off" : "on");
      setOn(!on);
    },
  };
}

/** @returns whether the key meant something here */
function actOnKey(key: string, show: Desk["show"]): boolean {
  const id = document.activeElement?.closest<HTMLElement>("[data-line]")?.dataset["line"];
  const rows = lineRows();
  const at = rows.findIndex((row) => row.dataset["line"] === id);
  if (key === "j" || key === "k") {
    const next = rows[key === "j" ? at + 1 : Math.max(at - 1, 0)];
    next?.focus();
    return next !== undefined;
  }
  const row = rows[at];
  if (!row || id === undefined) return false;
  if (key === "a") {
    const form = row.querySelector<HTMLFormElement>('form[data-intent="accept"]');
    form?.requestSubmit();
    return form !== null;
  }
  const form = key === "d" ? "decline" : key === "c" ? "comment" : null;
  if (form === null || row.dataset[form] !== "yes") return false;
  show(formKey(form, id));
  return true;
}

/** Takes the focus when it appears: the first field of a form that was just opened. */
export function useFocusOnOpen<T extends HTMLElement>(): React.RefObject<T | null> {
  const field = useRef<T>(null);
  useEffect(() => {
    field.current?.focus();
  }, []);
  return field;
}
