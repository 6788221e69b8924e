/**
 * Who may talk to the server. Three things are asked of every request, before anything else is done with it:
 *
 * - its `Host` names this machine as the server knows it, so that a name of someone else's that resolves here is
 *   refused (DNS rebinding);
 * - its `Origin`, where a browser sends one, is the server's own or on this machine, so that pages of other sites are
 *   refused;
 * - it bears the token, in `Authorization: token …` or as `?token=…`.
 */
import { createHash, randomBytes, timingSafeEqual } from "node:crypto";
import type { IncomingHttpHeaders } from "node:http";
import { isIP } from "node:net";

export interface Refusal {
  readonly status: 400 | 401 | 403;
  readonly message: string;
}

const LOOPBACK = new Set(["localhost", "127.0.0.1", "[::1]"]);
/** Addresses that mean "all of this machine's". */
const WILDCARDS = new Set(["0.0.0.0", "::"]);

/** A new token: 32 random bytes in hexadecimal. */
export function makeToken(): string {
  return randomBytes(32).toString("hex");
}

export class Access {
  readonly #token: Buffer;
  readonly #host: string;

  /**
   * @param token not empty
   * @param host the address that the server listens at
   */
  constructor(token: string, host: string) {
    if (token === "") throw new Error("the server needs a token");
    this.#token = digest(token);
    this.#host = host;
  }

  /** Why a request is refused; null if it is not. */
  findRefusal(headers: IncomingHttpHeaders, url: URL): Refusal | null {
    const host = hostNameOf(`http://${headers.host ?? ""}`);
    if (host === null) return { status: 400, message: "the request has no valid Host header" };
    if (!this.#isOwnHost(host)) return { status: 403, message: `the host ${host} is not this server` };
    const { origin } = headers;
    if (origin !== undefined && !this.#isOwnOrigin(origin, headers.host!)) {
      return { status: 403, message: `requests from ${origin.slice(0, 200)} are refused` };
    }
    const token = tokenOf(headers, url);
    if (token === null) {
      return { status: 401, message: "a token is needed: Authorization: token … or ?token=…" };
    }
    if (!timingSafeEqual(digest(token), this.#token)) {
      return { status: 403, message: "the token is not the one that the server printed when it started" };
    }
    return null;
  }

  #isOwnHost(host: string): boolean {
    if (LOOPBACK.has(host) || host === this.#host) return true;
    // An address cannot be made to resolve elsewhere, as a name can.
    return WILDCARDS.has(this.#host) && isIP(host.replace(/^\[|\]$/g, "")) !== 0;
  }

  #isOwnOrigin(origin: string, host: string): boolean {
    const name = hostNameOf(origin);
    if (name === null) return false;
    return LOOPBACK.has(name) || new URL(origin).host === host;
  }
}

/** The host's name without the port; null where there is none. */
function hostNameOf(origin: string): string | null {
  const url = URL.canParse(origin) ? new URL(origin) : null;
  return url === null || url.hostname === "" ? null : url.hostname;
}

function tokenOf(headers: IncomingHttpHeaders, url: URL): string | null {
  const [, fromHeader] = /^(?:token|bearer)\s+(.+)$/i.exec(headers.authorization ?? "") ?? [];
  return fromHeader ?? url.searchParams.get("token");
}

/** Of equal length for all tokens, as the comparison needs. */
function digest(token: string): Buffer {
  return createHash("sha256").update(token).digest();
}
