/** The one table of error codes: what each means over HTTP. Screens, API and jobs all use it. */
export const ERROR_CODES = {
  bad_request: { status: 400, title: "The request could not be read" },
  unauthorized: { status: 401, title: "Sign in first" },
  forbidden: { status: 403, title: "Your role does not allow this" },
  not_found: { status: 404, title: "Not found" },
  method_not_allowed: { status: 405, title: "This address does not take that method" },
  conflict: { status: 409, title: "Conflicts with what is already there" },
  not_acceptable: { status: 406, title: "Not available in that form" },
  request_timeout: { status: 408, title: "The request did not arrive in time" },
  gone: { status: 410, title: "No longer available" },
  too_large: { status: 413, title: "Too large" },
  address_too_long: { status: 414, title: "The address is too long" },
  unsupported_file: { status: 415, title: "Unknown kind of file" },
  unprocessable: { status: 422, title: "The input breaks a rule" },
  too_many_requests: { status: 429, title: "Slow down" },
  headers_too_large: { status: 431, title: "The headers are too large" },
  internal: { status: 500, title: "Something went wrong on our side" },
  not_implemented: { status: 501, title: "Not built yet" },
  unavailable: { status: 503, title: "A service this needs does not answer" },
} as const;

export type ErrorCode = keyof typeof ERROR_CODES;

/** Where in the input a rule was broken: a JSON path, a line of a file, or a named column. */
export interface ErrorPlace {
  path?: string;
  line?: number;
  column?: string;
  message: string;
}

/** An error the person should see. `message` is for the log, `userMessage` for the screen; `detailCode` narrows `code`. */
export class AppError extends Error {
  readonly code: ErrorCode;
  readonly userMessage: string;
  readonly detailCode: string;
  readonly places: ErrorPlace[];
  readonly extra: Record<string, unknown>;

  constructor(
    code: ErrorCode,
    userMessage: string,
    options: { detailCode?: string; places?: ErrorPlace[]; extra?: Record<string, unknown>; cause?: unknown } = {},
  ) {
    super(`${code}: ${userMessage}`, { cause: options.cause });
    this.name = "AppError";
    this.code = code;
    this.userMessage = userMessage;
    this.detailCode = options.detailCode ?? code;
    this.places = options.places ?? [];
    this.extra = options.extra ?? {};
  }

  get status(): number {
    return ERROR_CODES[this.code].status;
  }
}
