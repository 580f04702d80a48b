import { Link } from "react-router";
import { problemKinds } from "#app/http/problem.ts";
import { paths } from "#app/paths.ts";
import { Prose } from "#app/ui/Prose.tsx";
import { Shell } from "#app/ui/Shell.tsx";
import { Table } from "#app/ui/Table.tsx";
import type { Reference, ReferenceAnswer, ReferenceEndpoint, ReferenceField, ReferenceShape } from "./reference.ts";

/** Each address of the contract, then each named shape. */
export function ReferenceSection({ reference }: { reference: Reference }) {
  return (
    <>
      <ul className="mt-4 space-y-1">
        {reference.endpoints.map((endpoint) => (
          <li key={endpoint.id}>
            <a href={`#${endpoint.id}`}>{endpoint.summary}</a>
          </li>
        ))}
      </ul>
      {reference.endpoints.map((endpoint) => (
        <Endpoint key={endpoint.id} endpoint={endpoint} />
      ))}
      <h3 className="section-head" id="shapes">
        Shapes
      </h3>
      {reference.shapes.map((shape) => (
        <Shape key={shape.name} shape={shape} />
      ))}
    </>
  );
}

function Endpoint({ endpoint }: { endpoint: ReferenceEndpoint }) {
  const { id, method, path, summary, description, needsKey, parameters, bodies, command, answers } = endpoint;
  return (
    <div className="mt-9 border-t border-rule pt-4">
      <h3 className="font-semibold break-words" id={id}>
        {method} {path}
      </h3>
      <p className="mt-1 max-w-[68ch]">
        {summary}. <span className="text-soft">{needsKey ? "Needs a key." : "Needs no key."}</span>
      </p>
      <p className="mt-1 mb-3 max-w-[68ch] text-soft">{description}</p>
      {parameters.length > 0 && (
        <Table caption={`Parameters of ${method} ${path}`} even className="max-w-[60rem]">
          <thead>
            <tr>
              <th scope="col">Parameter</th>
              <th scope="col">In</th>
              <th scope="col">What it says</th>
              <th scope="col">Example</th>
            </tr>
          </thead>
          <tbody>
            {parameters.map((parameter) => (
              <tr key={`${parameter.where} ${parameter.name}`}>
                <th scope="row" className="tight">
                  {parameter.name}
                </th>
                <td className="tight">{parameter.where}</td>
                <td className="wide">{parameter.description}</td>
                <td className="tight">{parameter.example}</td>
              </tr>
            ))}
          </tbody>
        </Table>
      )}
      {bodies.map(({ mediaType, fields }) =>
        fields.length > 0 ? (
          <div key={mediaType} className="mt-4">
            <p className="mb-1 text-soft">Sent as {mediaType}:</p>
            <Fields caption={`Fields of the ${mediaType} body of ${method} ${path}`} fields={fields} />
          </div>
        ) : (
          <p key={mediaType} className="mt-3 text-soft">
            Sent as {mediaType}: the bytes of the file.
          </p>
        ),
      )}
      <Shell label={`Example of ${method} ${path}`}>{command}</Shell>
      <dl className="mt-3 max-w-[72ch] space-y-1">
        {answers.map((answer) => (
          <div key={answer.status} className="flex gap-x-4">
            <dt className="w-10 shrink-0">
              <Status status={answer.status} />
            </dt>
            <dd className="min-w-0 text-soft">
              {answer.description}
              {answer.status < 400 && answer.mediaType && <span className="text-ink"> {answer.mediaType}</span>}
              {answer.fields.length > 0 && <AnswerFields endpoint={endpoint} answer={answer} />}
            </dd>
          </div>
        ))}
      </dl>
    </div>
  );
}

/** A status; one that refuses leads to the page that explains it. */
function Status({ status }: { status: number }) {
  const [slug] = Object.entries(problemKinds).find(([, kind]) => kind.status === status) ?? [];
  return slug ? <Link to={paths.problem(slug)}>{status}</Link> : <>{status}</>;
}

function AnswerFields({ endpoint, answer }: { endpoint: ReferenceEndpoint; answer: ReferenceAnswer }) {
  return (
    <details className="disclosure text-ink">
      <summary>Its fields</summary>
      <Fields caption={`Fields of the answer to ${endpoint.method} ${endpoint.path}`} fields={answer.fields} />
    </details>
  );
}

function Fields({ caption, fields }: { caption: string; fields: readonly ReferenceField[] }) {
  return (
    <Table caption={caption} even className="max-w-[60rem]">
      <thead>
        <tr>
          <th scope="col">Field</th>
          <th scope="col">Type</th>
          <th scope="col">What it says</th>
        </tr>
      </thead>
      <tbody>
        {fields.map((field) => (
          <tr key={field.name}>
            <th scope="row" className="tight">
              {field.name}
              {field.optional && <span className="font-normal text-soft"> (may be missing)</span>}
            </th>
            <td>{field.shape ? <a href={`#shape-${field.shape}`}>{field.type}</a> : field.type}</td>
            <td className="wide">{field.description}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

function Shape({ shape }: { shape: ReferenceShape }) {
  return (
    <div className="mt-6">
      <h4 className="font-semibold" id={`shape-${shape.name}`}>
        {shape.name}
      </h4>
      {shape.description && (
        <p className="mt-1 mb-2 max-w-[68ch] text-soft">
          <Prose text={shape.description} />
        </p>
      )}
      {shape.values.length > 0 && <p className="max-w-[68ch]">One of {shape.values.join(", ")}.</p>}
      {shape.fields.length > 0 && <Fields caption={`Fields of ${shape.name}`} fields={shape.fields} />}
    </div>
  );
}
