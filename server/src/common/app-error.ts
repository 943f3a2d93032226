/** Every expected failure of the API: its status and its title, in one place. */
export const APP_ERRORS = {
  VALIDATION_FAILED: { status: 400, title: 'Some values are not acceptable' },
  BAD_REQUEST: { status: 400, title: 'The request could not be understood' },
  SIGNED_OUT: { status: 401, title: 'Sign in first' },
  WRONG_CREDENTIALS: { status: 401, title: 'E-mail or password is wrong' },
  NOT_ALLOWED: { status: 403, title: 'Your role does not allow this' },
  CSRF_REFUSED: { status: 403, title: 'The request did not come from this site’s own page' },
  WRONG_SECRET: { status: 403, title: 'The set-up secret is wrong' },
  NOT_FOUND: { status: 404, title: 'Not found' },
  REQUEST_TIMEOUT: { status: 408, title: 'The request took too long to arrive' },
  CONFLICT: { status: 409, title: 'The request conflicts with what is stored' },
  EMAIL_TAKEN: { status: 409, title: 'This e-mail address already has an account' },
  LAST_ADMINISTRATOR: { status: 409, title: 'The last administrator can’t be removed' },
  EVIDENCE_DAMAGED: { status: 409, title: 'The stored file is damaged' },
  EVIDENCE_MISSING: { status: 410, title: 'The stored file is missing' },
  TOKEN_SPENT: { status: 410, title: 'This link was used already or has run out' },
  BODY_TOO_LARGE: { status: 413, title: 'The request is too large' },
  FILE_TOO_LARGE: { status: 413, title: 'The file is too large' },
  NOT_A_WAV: { status: 415, title: 'The file is not a WAV file' },
  UNSUPPORTED_MEDIA_TYPE: { status: 415, title: 'This kind of content is not accepted' },
  RANGE_NOT_SATISFIABLE: { status: 416, title: 'The file has no such part' },
  WAV_UNREADABLE: { status: 422, title: 'The WAV file can’t be read' },
  UNPROCESSABLE: { status: 422, title: 'The request can’t be carried out as it stands' },
  TOO_MANY_REQUESTS: { status: 429, title: 'Too many attempts' },
  INTERNAL: { status: 500, title: 'Something went wrong on the server' },
  UNAVAILABLE: { status: 503, title: 'The service is not available at the moment' },
  STORAGE_FULL: { status: 507, title: 'There is no room left for the file' },
} as const satisfies Record<string, { status: number; title: string }>;

export type AppErrorCode = keyof typeof APP_ERRORS;

export interface AppErrorDetails {
  /** One plain sentence about this case, shown to the person. */
  readonly detail?: string;
  /** Byte offset in an uploaded file. */
  readonly offset?: number;
  /** What stood there. */
  readonly found?: string;
  /** What the person can do about it. */
  readonly remedy?: string;
  /** Messages by the path of the field they are about. */
  readonly fields?: Readonly<Record<string, readonly string[]>>;
  /** Seconds after which trying again makes sense; sent as Retry-After. */
  readonly retryAfterS?: number;
  /** A more exact code than the table's, e.g. the reader's own. */
  readonly reason?: string;
}

/** An expected failure: thrown anywhere, written as problem+json by the filter. */
export class AppError extends Error {
  override readonly name = 'AppError';

  constructor(
    readonly code: AppErrorCode,
    readonly details: AppErrorDetails = {},
  ) {
    super(details.detail ?? APP_ERRORS[code].title);
  }

  get status(): number {
    return APP_ERRORS[this.code].status;
  }
}
