const LOOPBACK_HOST = /^(localhost|127\.0\.0\.1|\[::1\])(:\d+)?$/;

/**
 * Whether a call that rides on the session cookie came from our own pages. Next's check of server actions lets a
 * missing Origin and a forged X-Forwarded-Host through; this one believes neither: what the browser says must agree
 * with PUBLIC_URL, or, where that is unset, with the loopback name that the call was made to.
 *
 * Origin and Sec-Fetch-Site are both set by the browser and out of a page's reach. Each that is present must agree,
 * and at least one must be present.
 */
export function isSameOrigin(headers: Headers, publicOrigin: string | null): boolean {
  const expected = publicOrigin ?? loopbackOrigin(headers.get("host"));
  if (expected === null) {
    return false;
  }
  const origin = headers.get("origin");
  const site = headers.get("sec-fetch-site");
  if (origin === null && site === null) {
    return false;
  }
  return (origin === null || origin === expected) && (site === null || site === "same-origin");
}

/** A name that only this machine answers to: another name that resolves here is a rebinding attempt. */
function loopbackOrigin(host: string | null): string | null {
  return host !== null && LOOPBACK_HOST.test(host) ? `http://${host}` : null;
}
