/** An error with a code, a status and a sentence that a person can act on. Thrown anywhere, answered in one place. */
export class ActionError extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly fields?: Record<string, string>,
  ) {
    super(message);
    this.name = new.target.name;
  }
}

/** 400: what was sent cannot be taken; `fields` names the places. */
export class InvalidInput extends ActionError {
  constructor(message: string, fields?: Record<string, string>, code = 'input.invalid') {
    super(400, code, message, fields);
  }
}

/** 401 */
export class NotSignedIn extends ActionError {
  constructor(message = 'Please sign in.', code = 'session.none') {
    super(401, code, message);
  }
}

/** 403 */
export class NotAllowed extends ActionError {
  constructor(message = 'Your role does not allow this.', code = 'role.not_allowed') {
    super(403, code, message);
  }
}

/** 404: also for records that exist and are not for this person, so that nothing can be learned by asking. */
export class NotFound extends ActionError {
  constructor(what = 'This record') {
    super(404, 'record.not_found', `${what} does not exist, or is not for you.`);
  }
}

/** 409: the state of things does not allow it now. */
export class Conflict extends ActionError {
  constructor(code: string, message: string, fields?: Record<string, string>) {
    super(409, code, message, fields);
  }
}

/** 409: somebody else changed the record since it was read. */
export class ChangedMeanwhile extends Conflict {
  constructor() {
    super(
      'record.changed',
      'Somebody else changed this since you opened it. Load it again and repeat your change.',
    );
  }
}

/** 413 */
export class TooLarge extends ActionError {
  constructor(message: string, code = 'upload.too_large') {
    super(413, code, message);
  }
}

/** 429 */
export class TooMany extends ActionError {
  constructor(
    message: string,
    readonly retryAfterSeconds: number,
    code = 'limit.reached',
  ) {
    super(429, code, message);
  }
}

/** 503 */
export class NotReady extends ActionError {
  constructor(
    message = 'The database does not answer. Nothing was changed; please try again in a moment.',
  ) {
    super(503, 'service.not_ready', message);
  }
}
