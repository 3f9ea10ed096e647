/** The sentence for the code that a refused sign-in came back with (see signInWithPassword). */
export function signInRefusal(code: string | null): string {
  if (code === "CredentialsSignin") {
    return "This email address and password do not belong together. Check both and try again.";
  }
  const seconds = code === null ? undefined : /^throttled:(\d+)$/.exec(code)?.[1];
  if (seconds !== undefined) {
    const minutes = Math.max(1, Math.ceil(Number(seconds) / 60));
    return `Too many attempts for this address. Wait ${minutes} ${minutes === 1 ? "minute" : "minutes"}, then try again.`;
  }
  return "The server could not check this now. Try again in a moment.";
}

/**
 * The path that a visitor is led to after signing in: on this server only. What could be read as another host
 * ("//elsewhere", "/\\elsewhere") or is no path at all becomes the list of studies.
 */
export function safeDestination(wanted: unknown): string {
  if (typeof wanted !== "string" || !/^\/(?![/\\])[^\\\s]*$/.test(wanted)) {
    return "/studies";
  }
  const base = "http://here.invalid";
  const url = new URL(wanted, base);
  const leads =
    url.origin === base && !url.pathname.startsWith("/sign-in") && !url.pathname.startsWith("/api/");
  return leads ? url.pathname + url.search + url.hash : "/studies";
}
