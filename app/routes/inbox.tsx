import { Link } from "react-router";
import { config } from "#app/config.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { forPage } from "#app/http/respond.server.ts";
import { findReceivedLetters } from "#app/notify/inbox.server.ts";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/inbox";

export const meta: Route.MetaFunction = () => [{ title: "Inbox · Tablewright" }];

/** The demo's letters. With a database of one's own, letters go to their people, and nothing stands here. */
export const loader = forPage(async () => {
  const { mailFolder, publicUrl } = config();
  if (mailFolder === null) throw new NotFound("There is nothing at this address.");
  return { letters: await findReceivedLetters(mailFolder), site: publicUrl };
});

export default function InboxPage({ loaderData }: Route.ComponentProps) {
  const { letters, site } = loaderData;
  return (
    <Leaf heading="Inbox" lede="The demo sends no mail. What it would have sent stands here, the newest first.">
      {letters.length === 0 ? (
        <EmptyPage>
          No letter has come yet. One comes when a revision is sent to review or a password is forgotten.
        </EmptyPage>
      ) : (
        letters.map(({ id, to, subject, text, at }) => (
          <article key={id} className="max-w-3xl border-t border-rule py-5" aria-labelledby={`subject-${id}`}>
            <h2 id={`subject-${id}`} className="text-head font-semibold">
              {subject}
            </h2>
            <p className="fine">
              To {to}
              {at && (
                <>
                  , <Time at={at} withTime />
                </>
              )}
            </p>
            <p className="mt-3 whitespace-pre-wrap break-words">
              <LetterText text={text} site={site} />
            </p>
          </article>
        ))
      )}
    </Leaf>
  );
}

/** A letter's text, its addresses of this site as links. */
function LetterText({ text, site }: { text: string; site: string }) {
  return text
    .trim()
    .split(/(https?:\/\/\S+)/)
    .map((part, index) =>
      part.startsWith(`${site}/`) ? (
        <Link key={index} to={part.slice(site.length)}>
          {part}
        </Link>
      ) : (
        part
      ),
    );
}
