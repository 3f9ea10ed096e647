import { expect, test } from "vitest";
import { arrivingBytes, BrokenUpload } from "./arriving-bytes";

/** Real Request objects with real streams, as the route handler gets them. */

function request(
  body: ReadableStream<Uint8Array> | Uint8Array<ArrayBuffer>,
  headers: Record<string, string> = {},
): Request {
  return new Request("http://localhost/uploads", {
    method: "POST",
    headers,
    body,
    // Node asks for this with a stream; the DOM's types do not know it.
    ...{ duplex: "half" },
  });
}

async function collected(chunks: AsyncIterable<Uint8Array>): Promise<number> {
  let size = 0;
  for await (const chunk of chunks) size += chunk.byteLength;
  return size;
}

test("gives the bytes as they come and the length that was declared", async () => {
  const arriving = arrivingBytes(request(new Uint8Array(70_000), { "content-length": "70000" }));
  expect(arriving.declaredBytes).toBe(70_000);
  expect(await collected(arriving.chunks)).toBe(70_000);
});

test("a length that is missing or no number counts as not declared", () => {
  expect(arrivingBytes(request(new Uint8Array(3))).declaredBytes).toBeNull();
  expect(arrivingBytes(request(new Uint8Array(3), { "content-length": "-1" })).declaredBytes).toBeNull();
  expect(arrivingBytes(request(new Uint8Array(3), { "content-length": "1e9" })).declaredBytes).toBeNull();
});

test("a connection that breaks is told apart from an error of ours", async () => {
  const broken = new ReadableStream<Uint8Array>({
    start(controller) {
      controller.enqueue(new Uint8Array(10));
    },
    pull(controller) {
      controller.error(new Error("aborted"));
    },
  });
  await expect(collected(arrivingBytes(request(broken)).chunks)).rejects.toBeInstanceOf(BrokenUpload);
});

test("what is left is read on and thrown away, so that the sender sees the answer", async () => {
  let given = 0;
  const long = new ReadableStream<Uint8Array>({
    pull(controller) {
      given += 1;
      if (given > 40) controller.close();
      else controller.enqueue(new Uint8Array(100_000));
    },
  });
  const arriving = arrivingBytes(request(long));
  for await (const _first of arriving.chunks) break;
  await arriving.discardRest();
  expect(given).toBe(41);
});
