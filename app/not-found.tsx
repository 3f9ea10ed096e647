import type { Metadata } from "next";
import Link from "next/link";

export const metadata: Metadata = { title: "Nothing here" };

/** One answer for what does not exist, was never shared with the reader, or belongs to another group. */
export default function NotFound() {
  return (
    <main id="main" className="mx-auto max-w-[640px] px-6 py-16">
      <h1 className="font-medium font-serif text-title">There is nothing at this address for you</h1>
      <p className="mt-3 text-ink-2">
        The address may be mistyped, or what was here belongs to a group that you are not a member of. A
        shared study opens from the link that you were sent, while that link is valid.
      </p>
      <p className="mt-6">
        <Link className="button" href="/studies">
          Go to the studies
        </Link>
      </p>
    </main>
  );
}
