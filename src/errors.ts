/** What can go wrong in a use-case, in the domain's words. HTTP maps these; nothing here knows a status code. */

export interface Issue {
  /** JSON pointer into the request body, e.g. `/traces/0/unit`; empty for the whole. */
  pointer: string;
  message: string;
}

export abstract class DomainError extends Error {
  abstract readonly kind: string;
}

export class Unauthenticated extends DomainError {
  readonly kind = 'unauthenticated';
  constructor(message = 'Sign in first.') {
    super(message);
  }
}

export class Forbidden extends DomainError {
  readonly kind = 'forbidden';
  constructor(message = 'Your role does not include this.') {
    super(message);
  }
}

/** Also the answer for a record of another organisation. */
export class NotFound extends DomainError {
  readonly kind = 'not-found';
  constructor(what: string) {
    super(`There is no such ${what}.`);
  }
}

export class Invalid extends DomainError {
  readonly kind = 'invalid';
  constructor(
    readonly issues: Issue[],
    message = 'Some entries need another look.',
  ) {
    super(message);
  }
}

/** A file that cannot be read as asked: where, what was found, what was expected. */
export class Unreadable extends DomainError {
  readonly kind = 'unreadable';
  constructor(
    message: string,
    readonly line: number | null,
    readonly found: string,
    readonly expected: string,
  ) {
    super(message);
  }
}

export class Conflict extends DomainError {
  readonly kind = 'conflict';
}

export class StaleVersion extends DomainError {
  readonly kind = 'stale-version';
  constructor(
    readonly current: number,
    what: string,
  ) {
    super(`Somebody changed this ${what} since you opened it. Load it again and repeat your change.`);
  }
}

export class TooLarge extends DomainError {
  readonly kind = 'too-large';
}

export class Throttled extends DomainError {
  readonly kind = 'throttled';
  constructor(
    readonly retryAfterS: number,
    message: string,
  ) {
    super(message);
  }
}
