/** A sender that went away, or whose connection broke, while its file was arriving. */
export class BrokenUpload extends Error {}

export interface ArrivingBytes {
  /** What the sender announced; null where it announced nothing. */
  readonly declaredBytes: number | null;
  /** The body as it comes. Throws BrokenUpload where it breaks off. */
  readonly chunks: AsyncIterable<Uint8Array>;
  /**
   * Reads on for a while without keeping anything: a sender that is cut off in the middle of its file never sees the
   * answer that says why.
   */
  discardRest(): Promise<void>;
}

/** Enough for a sender to finish a file somewhat over the limit; more is cut off. */
const DISCARDED_BYTES = 256 * 1024 * 1024;
const DISCARDED_MS = 20_000;

export function arrivingBytes(request: Request): ArrivingBytes {
  const reader = request.body?.getReader();
  let ended = reader === undefined;
  async function read(): Promise<Uint8Array | undefined> {
    if (reader === undefined || ended) return undefined;
    try {
      const { done, value } = await reader.read();
      ended = done;
      return value;
    } catch {
      // The stream's own error says no more than that the connection is gone.
      ended = true;
      throw new BrokenUpload();
    }
  }
  async function* chunks(): AsyncGenerator<Uint8Array> {
    for (let chunk = await read(); chunk !== undefined; chunk = await read()) yield chunk;
  }
  return {
    declaredBytes: declaredLength(request.headers),
    chunks: chunks(),
    async discardRest() {
      const until = Date.now() + DISCARDED_MS;
      let discarded = 0;
      while (!ended && discarded < DISCARDED_BYTES && Date.now() < until) {
        try {
          discarded += (await read())?.byteLength ?? 0;
        } catch {
          return;
        }
      }
      if (!ended) await reader?.cancel();
    },
  };
}

function declaredLength(headers: Headers): number | null {
  const length = headers.get("content-length");
  return length !== null && /^\d{1,15}$/.test(length) ? Number(length) : null;
}
