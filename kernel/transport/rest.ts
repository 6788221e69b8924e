/** Requests and answers of the REST side, apart from HTTP. */

export interface RestRequest {
  readonly method: string;
  /** The path's parts, decoded: `["api", "kernels"]`. */
  readonly path: readonly string[];
  readonly query: URLSearchParams;
  /** The body's JSON; undefined where there is no body. */
  readonly body: unknown;
}

export interface RestResponse {
  readonly status: number;
  readonly headers?: Readonly<Record<string, string>>;
  /** Sent as JSON; undefined for none. */
  readonly body?: unknown;
}

/** The body of every failure, in the form that front ends show. */
export function failure(status: number, message: string): RestResponse {
  return { status, body: { message, reason: null } };
}
