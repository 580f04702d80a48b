/**
 * The few ways in which the laboratory's work can be refused. An act of a room throws one of these; one place
 * (`respond.server.ts`) turns it into a page or a problem document. Nothing else may decide on a status.
 */

/** What is wrong with one field of what was sent: a JSON Pointer (RFC 6901) into it, and a sentence. */
export interface FieldError {
  pointer: string;
  detail: string;
}

/**
 * Common part of the named errors. `message` is the sentence a person reads: where, what, what to do.
 * `kind` ends the address of the page that explains the error (`/problems/<kind>`).
 */
export abstract class DomainError extends Error {
  abstract readonly status: number;
  abstract readonly kind: string;
  abstract readonly title: string;

  constructor(sentence: string) {
    super(sentence);
    this.name = new.target.name;
  }
}

/** 400: the request itself could not be read (broken body, unknown parameter, a parameter given twice). */
export class BadRequest extends DomainError {
  readonly status = 400;
  readonly kind = "bad-request";
  readonly title = "The request could not be read";
}

/** 401: nobody is signed in, or the key is missing, unknown, withdrawn or past its time. */
export class Unauthenticated extends DomainError {
  readonly status = 401;
  readonly kind = "unauthenticated";
  readonly title = "Sign in first";
}

/** 403: this person or key may not do this. */
export class Forbidden extends DomainError {
  readonly status = 403;
  readonly kind = "forbidden";
  readonly title = "Not allowed";
}

/** 404: there is no such thing, or it is not this person's to see. */
export class NotFound extends DomainError {
  readonly status = 404;
  readonly kind = "not-found";
  readonly title = "Not found";
}

/** 409: what was asked contradicts how things stand now (an illegal move, a list that has changed meanwhile). */
export class Refused extends DomainError {
  readonly status = 409;
  readonly kind = "refused";
  readonly title = "Refused as things stand";
}

/** 413: what was sent is larger than the documented limit. */
export class TooLarge extends DomainError {
  readonly status = 413;
  readonly kind = "too-large";
  readonly title = "Too large";
}

/** 415: the body is in a form this address does not read. */
export class UnsupportedMedia extends DomainError {
  readonly status = 415;
  readonly kind = "unsupported-media";
  readonly title = "This form of body is not read here";
}

/** 422: the request was read, but a value in it cannot be accepted; `errors` names each field. */
export class Invalid extends DomainError {
  readonly status = 422;
  readonly kind = "invalid";
  readonly title = "A value cannot be accepted";
  readonly errors: readonly FieldError[];

  constructor(sentence: string, errors: readonly FieldError[] = []) {
    super(sentence);
    this.errors = errors;
  }
}

/** 429: too many tries; `retryAfter` is the number of whole seconds to wait. */
export class TooMany extends DomainError {
  readonly status = 429;
  readonly kind = "too-many";
  readonly title = "Too many requests";
  readonly retryAfter: number;

  constructor(sentence: string, retryAfter: number) {
    super(sentence);
    this.retryAfter = Math.max(1, Math.ceil(retryAfter));
  }
}
