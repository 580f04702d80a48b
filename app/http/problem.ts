import { type DomainError, type FieldError, Invalid } from "./errors.ts";

/** A problem document as RFC 9457 describes it. */
export interface Problem {
  /** An address on this site that explains this kind of problem. */
  type: string;
  title: string;
  status: number;
  /** The sentence for this occurrence. */
  detail: string;
  /** The request's id, to be named when asking for help. */
  instance?: string;
  errors?: readonly FieldError[];
}

/** The media type of a problem document. */
export const PROBLEM_TYPE = "application/problem+json";

/** One kind of problem: what it means, and what to do about it. */
export interface ProblemKind {
  status: number;
  title: string;
  explanation: string;
  cure: string;
}

/** The kinds of problem, each explained at `/problems/<kind>`. `kind` values of the named errors, and a few of HTTP's. */
export const problemKinds: Readonly<Record<string, ProblemKind>> = {
  "bad-request": {
    status: 400,
    title: "The request could not be read",
    explanation:
      "The address, a parameter or the body of the request is not of a form that can be read: a parameter is unknown or given twice, the body is broken off, or an escape is malformed. Nothing was changed.",
    cure: "The sentence of the answer says which part could not be read. Repeat the request with it put right.",
  },
  unauthenticated: {
    status: 401,
    title: "Sign in first",
    explanation:
      "Pages need a signed-in person; the API needs a key in the Authorization header (Authorization: Bearer …). The key may be missing, mistyped, withdrawn or past its time.",
    cure: "Sign in, or send a key that is in use. Keys are made under Account, API keys.",
  },
  forbidden: {
    status: 403,
    title: "Not allowed",
    explanation:
      "The person, or the person’s key, does not hold the role or scope that this needs, or the request came from another site.",
    cure: "An administrator gives roles; scopes are chosen when a key is made. Open forms on this site itself.",
  },
  "not-found": {
    status: 404,
    title: "Not found",
    explanation: "There is nothing at this address, or it is not yours to see.",
    cure: "Look at the spelling of the address, and at the edition it names: a species may have come in later, or be called otherwise there.",
  },
  "method-not-allowed": {
    status: 405,
    title: "This address does not answer that method",
    explanation: "The address exists, but not for this method: an edition can be read and never written.",
    cure: "The Allow header of the answer lists the methods that this address answers.",
  },
  refused: {
    status: 409,
    title: "Refused as things stand",
    explanation:
      "What was asked contradicts how things stand now: somebody else was faster, a list has changed since it was shown, or the step is not the next one. Nothing was changed.",
    cure: "Look at it again as it stands now, then decide anew.",
  },
  "too-large": {
    status: 413,
    title: "Too large",
    explanation: "What was sent exceeds the documented limit, and was not taken.",
    cure: "The sentence of the answer names the limit. Send less at a time: a sheet can be cut in two.",
  },
  "unsupported-media": {
    status: 415,
    title: "This form of body is not read here",
    explanation: "The Content-Type of the body is not one that this address reads.",
    cure: "The sentence of the answer names the forms that it reads.",
  },
  invalid: {
    status: 422,
    title: "A value cannot be accepted",
    explanation:
      "The request was read, but at least one value in it cannot be accepted. Nothing of it was taken, so nothing is half done.",
    cure: "Each entry of errors points at a value (a JSON Pointer) and says what is wrong with it. Put those right and send the whole again.",
  },
  "too-many": {
    status: 429,
    title: "Too many requests",
    explanation: "A limit on the number of requests or tries was reached.",
    cure: "The Retry-After header says how many seconds to wait before the next one.",
  },
  unexpected: {
    status: 500,
    title: "Something went wrong on our side",
    explanation:
      "The service ran into an error that it does not know. Nothing was changed by this request; it is written down in the log.",
    cure: "Tell an administrator the request’s id, which stands in the answer and in the log.",
  },
  unavailable: {
    status: 503,
    title: "Not available just now",
    explanation: "The service is starting, stopping or waiting for its database.",
    cure: "Try again in a few seconds.",
  },
};

/** What a kind of problem means and what to do about it, in one paragraph. */
export function explained({ explanation, cure }: ProblemKind): string {
  return `${explanation} ${cure}`;
}

/** The address that explains a kind of problem. `publicUrl` is the service's origin. */
export function problemAddress(kind: string, publicUrl: string): string {
  return `${publicUrl}/problems/${kind}`;
}

/**
 * Writes a problem document of a kind.
 * @param kind a key of `problemKinds`; an unknown one becomes `unexpected`
 */
export function problemOf(kind: string, detail: string, publicUrl: string, requestId?: string): Problem {
  const known = Object.hasOwn(problemKinds, kind) ? kind : "unexpected";
  const { status, title } = problemKinds[known]!;
  return {
    type: problemAddress(known, publicUrl),
    title,
    status,
    detail,
    ...(requestId ? { instance: `urn:request:${requestId}` } : {}),
  };
}

/** The problem document for one of the named errors. */
export function problemFrom(error: DomainError, publicUrl: string, requestId?: string): Problem {
  const problem = problemOf(error.kind, error.message, publicUrl, requestId);
  return error instanceof Invalid && error.errors.length > 0 ? { ...problem, errors: error.errors } : problem;
}
