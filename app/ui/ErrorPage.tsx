import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { Leaf } from "./Leaf.tsx";
import { useRootData } from "./useRootData.ts";

const heads: Record<number, { head: string; help: string }> = {
  400: {
    head: "This cannot be read",
    help: "Something in the address or the form is not as it should be. Go back and try once more.",
  },
  401: { head: "Sign in to read this", help: "The page is for people of the laboratory." },
  403: {
    head: "This is not yours to open",
    help: "It needs a role you do not hold. An administrator can give it to you.",
  },
  404: {
    head: "Nothing stands at this address",
    help: "It may have been typed wrongly, or the species has another key in this edition.",
  },
  405: { head: "This cannot be done here", help: "Go back and use the buttons of the page." },
  409: {
    head: "Something else came first",
    help: "What you saw has changed meanwhile. Load the page again and decide anew.",
  },
  413: { head: "This is too large", help: "Send a smaller file, or split the sheet in two." },
  415: { head: "This kind of file cannot be read", help: "Send the sheet as CSV in UTF-8." },
  422: { head: "This cannot be taken as it is", help: "Go back and put right what is named below." },
  429: { head: "Too many at once", help: "Wait a minute and try again." },
};

const otherwise = {
  head: "This page could not be made",
  help: "The fault is ours and has been written down. Nothing you sent was half done: it was either taken whole or not at all.",
};

/** What to say for a status: a head and one sentence of help. One place, used by the pages and the tests. */
export function statusWords(status: number): { head: string; help: string } {
  return heads[status] ?? otherwise;
}

interface ErrorPageProps {
  status: number;
  /** The sentence of the refusal, if it is meant for people. */
  sentence?: string | undefined;
}

/** A page for what went wrong: what it is, what to do, and the ways on. */
export function ErrorPage({ status, sentence }: ErrorPageProps) {
  const { head, help } = statusWords(status);
  const { visitor, opens } = useRootData();
  return (
    <Leaf heading={head} lede={sentence ?? help}>
      {sentence && sentence !== help && <p className="max-w-[68ch]">{help}</p>}
      <ul className="mt-4 space-y-1">
        {!visitor && (
          <li>
            <Link to={paths.signIn()}>Sign in</Link>
          </li>
        )}
        {opens.includes("table") && (
          <>
            <li>
              <Link to={paths.table()}>The table, newest edition</Link>
            </li>
            <li>
              <Link to={paths.home()}>What waits for you</Link>
            </li>
          </>
        )}
        <li>
          <Link to={paths.conventions()}>Conventions</Link>
        </li>
      </ul>
      <p className="fine mt-6">Status {status}</p>
    </Leaf>
  );
}
