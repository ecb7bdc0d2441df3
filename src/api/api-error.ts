/** An answer of the server that says no, or no answer at all (`status` 0). `fields` names what is wrong where. */
export class ApiError extends Error {
  override readonly name = 'ApiError';

  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly fields: Readonly<Record<string, string>> = {},
  ) {
    super(message);
  }

  get isOffline(): boolean {
    return this.status === 0;
  }
}

/** The sentence to show for anything that was thrown. */
export function messageOf(error: unknown): string {
  if (error instanceof ApiError) return error.message;
  return 'Something went wrong on this page. Load it again; if it stays, tell your administrator.';
}
