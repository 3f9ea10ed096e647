"use client";

/** The frame stays, the page's place says what happened. The error itself is in the server's log, never here. */
export default function ErrorPage({ error, retry }: { error: unknown; retry: () => void }) {
  const reference = error instanceof Error && "digest" in error ? String(error.digest) : null;
  return (
    <main id="main" className="mx-auto max-w-[640px] px-6 py-16">
      <h1 className="font-medium font-serif text-title">This page could not be drawn</h1>
      <p className="mt-3 text-ink-2">
        The server met an error while making it. What is stored is untouched. Try again; if it happens again,
        give your administrator the time and this reference{reference === null ? "." : ": "}
        {reference !== null && <code>{reference}</code>}
      </p>
      <p className="mt-6">
        <button type="button" className="button primary" onClick={() => retry()}>
          Try again
        </button>
      </p>
    </main>
  );
}
