import { z } from "zod";
import { notFoundProblem } from "@/app/_server/problem";
import { route } from "@/app/_server/route";
import { dropUpload } from "@/db/upload/drop-upload";
import { openUpload } from "@/db/upload/upload.queries";

const nothing = z.object({});

/** The raw file, byte for byte, with its SHA-256 as `Repr-Digest` and `ETag`. */
export const GET = route(
  { schema: nothing, scope: "read", role: "reader" },
  async ({ params, actor, db }) => {
    const upload = await openUpload(db, actor, {
      studyId: params.studyId ?? "",
      uploadId: params.uploadId ?? "",
    });
    if (upload === undefined) return notFoundProblem();
    const bytes = upload.bytes()[Symbol.asyncIterator]();
    const body = new ReadableStream<Uint8Array>({
      async pull(controller) {
        const { done, value } = await bytes.next();
        if (done) controller.close();
        else controller.enqueue(value);
      },
      async cancel() {
        await bytes.return?.();
      },
    });
    return new Response(body, {
      headers: {
        "Content-Type": "application/octet-stream",
        "Content-Length": String(upload.size),
        "Content-Disposition": attachment(upload.fileName),
        "X-Content-Type-Options": "nosniff",
        "Repr-Digest": `sha-256=:${Buffer.from(upload.sha256, "hex").toString("base64")}:`,
        ETag: `"${upload.sha256}"`,
        "Cache-Control": "private, no-cache",
      },
    });
  },
);

/** Drops a file that waits for its preview. A file that runs were read from stays for good. */
export const DELETE = route(
  { schema: nothing, from: "query", scope: "write", role: "analyst" },
  async ({ params, actor, db }) => {
    const dropped = await dropUpload(db, actor, {
      studyId: params.studyId ?? "",
      uploadId: params.uploadId ?? "",
    });
    return dropped ? new Response(null, { status: 204 }) : notFoundProblem();
  },
);

/** The name in plain ASCII for old clients and in full beside it (RFC 6266). */
function attachment(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\%]/g, "_");
  const encoded = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (character) => `%${character.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`;
}
