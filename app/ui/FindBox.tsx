import { useEffect, useId, useRef, useState } from "react";
import { Form, useFetcher, useLocation, useNavigate } from "react-router";
import { paths } from "#app/paths.ts";
import { SpeciesName } from "./SpeciesName.tsx";

/** What the list under the box offers; as `/resources/find` answers it. */
interface Offered {
  text: string;
  suggestions: readonly {
    kind: "species" | "source" | "revision" | "edition" | "sheet" | "person";
    to: string;
    text: string;
    note: string;
  }[];
}

/** The list is asked for when typing rests this long, in milliseconds. */
const REST = 150;

/**
 * The find box of every page: a form that leads to /find and, once scripts have arrived, a combobox whose list offers what
 * fits so far (WAI-ARIA Authoring Practices, "Editable Combobox With List Autocomplete"). Down and up choose, Enter goes
 * there or, with nothing chosen, lists everything; Escape closes the list, and a second one empties the box.
 */
export function FindBox() {
  const fetcher = useFetcher<Offered>();
  const navigate = useNavigate();
  const { key: place } = useLocation();
  const listId = useId();
  const [typed, setTyped] = useState("");
  const [open, setOpen] = useState(false);
  const [chosen, setChosen] = useState(-1);
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);

  // On another page the list of the last one is not in the way.
  useEffect(() => {
    setOpen(false);
    setChosen(-1);
    return () => clearTimeout(timer.current);
  }, [place]);

  const text = typed.trim();
  const answer = fetcher.data?.text === text ? fetcher.data : undefined;
  const offers = text === "" ? [] : (answer?.suggestions ?? []);
  const shown = open && offers.length > 0;

  const type = (value: string): void => {
    setTyped(value);
    setOpen(true);
    setChosen(-1);
    clearTimeout(timer.current);
    const asked = value.trim();
    if (asked === "") return;
    timer.current = setTimeout(() => {
      void fetcher.load(`${paths.resource("find")}?q=${encodeURIComponent(asked)}`);
    }, REST);
  };

  const go = (to: string): void => {
    clearTimeout(timer.current);
    setTyped("");
    setOpen(false);
    void navigate(to);
  };

  const press = (event: React.KeyboardEvent): void => {
    switch (event.key) {
      case "ArrowDown":
      case "ArrowUp": {
        event.preventDefault();
        if (offers.length === 0) return;
        const step = event.key === "ArrowDown" ? 1 : -1;
        setOpen(true);
        // One place before the first stands for the box itself.
        setChosen(((chosen + 1 + step + offers.length + 1) % (offers.length + 1)) - 1);
        return;
      }
      case "Enter": {
        const offer = shown ? offers[chosen] : undefined;
        if (offer) {
          event.preventDefault();
          go(offer.to);
        } else {
          clearTimeout(timer.current);
          setOpen(false);
        }
        return;
      }
      case "Escape":
        event.preventDefault();
        if (shown) setOpen(false);
        else setTyped("");
        setChosen(-1);
    }
  };

  return (
    <Form method="get" action={paths.find()} role="search" className="leaf-find-form">
      <input
        className="leaf-find"
        type="search"
        name="q"
        aria-label="Find a species, source or revision"
        placeholder="Find a species, source, revision"
        autoComplete="off"
        maxLength={200}
        role="combobox"
        aria-autocomplete="list"
        aria-expanded={shown}
        aria-controls={listId}
        aria-activedescendant={shown && chosen >= 0 ? `${listId}-${chosen}` : undefined}
        value={typed}
        onChange={(event) => type(event.target.value)}
        onKeyDown={press}
        onBlur={() => setOpen(false)}
      />
      <ul id={listId} role="listbox" aria-label="What fits" className="find-list" hidden={!shown}>
        {offers.map((offer, index) => (
          <li
            key={offer.to}
            id={`${listId}-${index}`}
            role="option"
            aria-selected={index === chosen}
            // Before the box loses the focus, which would close the list under the pointer.
            onPointerDown={(event) => {
              event.preventDefault();
              go(offer.to);
            }}
          >
            <span className="find-what">
              {offer.kind === "species" ? <SpeciesName speciesKey={offer.text} /> : offer.text}
            </span>
            {offer.note !== "" && <span className="find-note"> {offer.note}</span>}
            {offer.kind === "source" && <span className="find-note"> source</span>}
          </li>
        ))}
      </ul>
      <span className="said" role="status">
        {open && text !== "" && answer
          ? offers.length === 0
            ? "Nothing fits so far."
            : `${offers.length} offered; down and up to choose.`
          : ""}
      </span>
    </Form>
  );
}
