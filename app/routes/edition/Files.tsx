import { Link } from "react-router";
import type { EditionPage } from "#app/editions/editionPage.server.ts";
import { fileName } from "#app/editions/tableFile.ts";
import { paths } from "#app/paths.ts";
import { Lede, Section } from "#app/ui/Section.tsx";
import { Hash } from "./Examined.tsx";

/** The edition as a file, its digest, and how anybody can work that out again. */
export function Files({ page: { frame, file, digest, previousDigest, previous } }: { page: EditionPage }) {
  const { number } = frame;
  return (
    <>
      <Section head="Download">
        <ul className="max-w-[68ch]">
          <li className="mb-2">
            <a href={paths.tableDownload(number)} download>
              {fileName(number)}
            </a>
            : every value with its digits, uncertainty, source and row hash, one line each
            {file && (
              <span className="fine block">
                {sizeInWords(file.length)}, SHA-256 <Hash text={file.sha256} />
              </span>
            )}
          </li>
          <li>
            <a href={paths.tableDescription(number)} download={`${fileName(number)}-metadata.json`}>
              {fileName(number)}-metadata.json
            </a>
            : what its columns mean, for programs that read tables (CSVW)
          </li>
        </ul>
        <p className="fine mt-3">
          Programs read the same with a key: <Link to={paths.apiGuide()}>for programs</Link>.
        </p>
      </Section>
      <Section head="Its digest" id="digest">
        <Lede>
          One number that stands for all of them: were a single digit of this edition other than it was published, its
          digest would be another.
        </Lede>
        <dl className="mb-3 grid max-w-[46rem] gap-x-4 sm:grid-cols-[auto_minmax(0,1fr)]">
          <dt className="text-soft">Edition {number}</dt>
          <dd className="mb-1">
            <Hash text={digest} />
          </dd>
          {previous !== null && previousDigest !== null && (
            <>
              <dt className="text-soft">
                <Link to={paths.edition(previous)}>Edition {previous}</Link>
              </dt>
              <dd className="mb-1">
                <Hash text={previousDigest} />
              </dd>
            </>
          )}
        </dl>
        <details className="disclosure" id="recipe">
          <summary>how it is worked out</summary>
          <ol className="mt-2 max-w-[68ch] list-decimal space-y-1 pl-5 text-soft">
            <li>
              Each value, each name of a species and each citation is written as JSON in the form of RFC 8785, with text
              in place of numbers, and hashed with SHA-256. The download has the hash of each value.
            </li>
            <li>
              The hashes are put one behind the other: first those of the values, by the bytes of species key and
              property; then those of the species, by key; then those of the sources, by id.
            </li>
            <li>
              Behind them stand the digest of the edition before (nothing for edition 1), the number of this one, a line
              feed and its licence. SHA-256 of all that is the digest.
            </li>
          </ol>
          <p className="mt-2 max-w-[68ch] text-soft">
            Whoever keeps the service runs <code className="font-sans font-medium text-ink">npm run verify</code>, which
            works out every edition again and names what does not agree.
          </p>
        </details>
      </Section>
    </>
  );
}

/** A length in bytes as people say it, in decimal thousands. */
function sizeInWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} bytes`;
  return bytes < 1_000_000 ? `${Math.round(bytes / 1000)} kB` : `${(bytes / 1_000_000).toFixed(1)} MB`;
}
