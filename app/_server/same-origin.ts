const LOOPBACK = /^(?:localhost|127\.0\.0\.1|\[::1\])(?::(\d+))?$/;

/**
 * Whether a call that rides on the session cookie came from our own pages. Next's check of server actions lets a
 * missing Origin and a forged X-Forwarded-Host through; this one believes neither: what the browser says must agree
 * with PUBLIC_URL, or, where that is unset, with the port of this machine that the call was made to.
 *
 * Origin and Sec-Fetch-Site are both set by the browser and out of a page's reach. Each that is present must agree,
 * and at least one must be present.
 */
export function isSameOrigin(headers: Headers, publicOrigin: string | null): boolean {
  const origin = headers.get("origin");
  const site = headers.get("sec-fetch-site");
  if (origin === null && site === null) {
    return false;
  }
  if (site !== null && site !== "same-origin") {
    return false;
  }
  return publicOrigin === null
    ? isThisMachine(origin, headers.get("host"))
    : origin === null || origin === publicOrigin;
}

/**
 * localhost and 127.0.0.1 are one server to us: Next hands an action on to another of its bundles under the second
 * name. A host of any other name that leads here is a rebinding attempt.
 */
function isThisMachine(origin: string | null, host: string | null): boolean {
  const asked = LOOPBACK.exec(host ?? "");
  if (asked === null || origin === null) {
    return asked !== null;
  }
  const from = origin.startsWith("http://") ? LOOPBACK.exec(origin.slice("http://".length)) : null;
  return from !== null && from[1] === asked[1];
}
