/** The file as a whole cannot be loaded: nothing of it is kept but its bytes. The message says what to do. */
export class FileRefused extends Error {
  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
    this.name = 'FileRefused';
  }
}

/** Another worker holds the upload now: stop, undo, say nothing. */
export class LeaseLost extends Error {
  constructor() {
    super('The upload was taken over by another worker.');
    this.name = 'LeaseLost';
  }
}
