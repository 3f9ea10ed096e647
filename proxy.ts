import { type NextRequest, NextResponse } from "next/server";

/**
 * Headers of every page: the content security policy with a nonce of its own, and what else a browser should hold
 * to. Nothing is decided here about who may see what; that is up to each query and action. `/api` stays outside: a
 * route that passes through receives at most 10 MB of a body and is not told.
 */
export function proxy(request: NextRequest): NextResponse {
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString("base64");
  const policy = contentSecurityPolicy(nonce);
  const { pathname, search } = request.nextUrl;

  const forwarded = new Headers(request.headers);
  // Next reads the nonce from the policy, the root layout from x-nonce, the sign-in redirect the path from x-path.
  forwarded.set("Content-Security-Policy", policy);
  forwarded.set("x-nonce", nonce);
  forwarded.set("x-path", pathname + search);

  const response = NextResponse.next({ request: { headers: forwarded } });
  response.headers.set("Content-Security-Policy", policy);
  response.headers.set("X-Content-Type-Options", "nosniff");
  response.headers.set("Cross-Origin-Opener-Policy", "same-origin");
  response.headers.set("Permissions-Policy", "camera=(), geolocation=(), microphone=()");
  if (pathname.startsWith("/share/")) {
    // The address is the key: it must not travel in a Referer, nor be found by a search.
    response.headers.set("Referrer-Policy", "no-referrer");
    response.headers.set("X-Robots-Tag", "noindex, nofollow");
  } else {
    response.headers.set("Referrer-Policy", "same-origin");
  }
  if (process.env.PUBLIC_URL?.startsWith("https://")) {
    response.headers.set("Strict-Transport-Security", "max-age=31536000");
  }
  return response;
}

export const config = {
  matcher: ["/((?!api/|_next/static/|_next/image|fonts/|icon\\.svg$|favicon\\.ico$).*)"],
};

function contentSecurityPolicy(nonce: string): string {
  const development = process.env.NODE_ENV === "development";
  return [
    "default-src 'self'",
    // React's development build rebuilds stacks with eval; the production build never does.
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? " 'unsafe-eval'" : ""}`,
    `style-src 'self' 'nonce-${nonce}'`,
    // Drawings position their labels with style attributes.
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    `connect-src 'self'${development ? " ws:" : ""}`,
    "worker-src 'self' blob:",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ].join("; ");
}
