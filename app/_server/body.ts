/** Large enough for 2,000 runs as numbers; files go through uploads, which stream. */
const JSON_LIMIT_BYTES = 8 * 1024 * 1024;

/** What is read beyond the limit and thrown away: most clients hear the answer only once they have sent all. */
const DRAINED_BYTES = 64 * 1024 * 1024;

export type JsonBody =
  | { readonly ok: true; readonly value: unknown }
  | { readonly ok: false; readonly status: 400 | 413 | 415; readonly detail: string };

/** Reads a JSON body, counting what really arrives: a declared length may be missing or wrong. */
export async function readJsonBody(request: Request, limitBytes = JSON_LIMIT_BYTES): Promise<JsonBody> {
  const type = request.headers.get("content-type") ?? "";
  if (!/^application\/([\w.+-]+\+)?json\b/i.test(type)) {
    return { ok: false, status: 415, detail: "Send the body as JSON, with Content-Type: application/json." };
  }
  const tooLarge = {
    ok: false,
    status: 413,
    detail: `The body is over the limit of ${Math.floor(limitBytes / (1024 * 1024))} MB. Send less in one call.`,
  } as const;
  const chunks: Uint8Array[] = [];
  let received = 0;
  for await (const chunk of request.body ?? []) {
    received += chunk.byteLength;
    if (received > limitBytes + DRAINED_BYTES) {
      return tooLarge;
    }
    if (received <= limitBytes) {
      chunks.push(chunk);
    }
  }
  if (received > limitBytes) {
    return tooLarge;
  }
  try {
    const text = new TextDecoder("utf-8", { fatal: true }).decode(Buffer.concat(chunks));
    return { ok: true, value: JSON.parse(text) };
  } catch {
    return { ok: false, status: 400, detail: "The body is not valid JSON in UTF-8." };
  }
}
