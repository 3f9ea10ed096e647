import { env } from "./env";

/** Under TLS the __Host- prefix ties the cookie to this very host; browsers refuse it on plain http. */
export const SECURE_COOKIES = env.publicOrigin?.startsWith("https://") ?? false;

export const SESSION_COOKIE = SECURE_COOKIES ? "__Host-ratewright-session" : "ratewright-session";
