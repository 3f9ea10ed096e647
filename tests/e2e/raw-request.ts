import { connect, type Socket } from "node:net";

/**
 * An HTTP request written onto a socket, for what no client would send: a long body without a length, or one that
 * breaks off.
 */
export interface RawRequest {
  readonly origin: string;
  readonly path: string;
  /** With `Transfer-Encoding: chunked` the pieces are sent as chunks. */
  readonly headers: Readonly<Record<string, string>>;
  readonly pieces: Iterable<Uint8Array>;
  /** Close the connection after the pieces instead of waiting for an answer. */
  readonly hangUp?: boolean;
}

export interface RawAnswer {
  /** null where the connection ended without an answer. */
  readonly status: number | null;
  readonly body: string;
}

export async function sendRaw({
  origin,
  path,
  headers,
  pieces,
  hangUp = false,
}: RawRequest): Promise<RawAnswer> {
  const { hostname, port, host } = new URL(origin);
  const socket = connect(Number(port), hostname);
  const answer = collect(socket);
  const lines = {
    Host: host,
    Origin: origin,
    "Content-Type": "application/octet-stream",
    Connection: "close",
    ...headers,
  };
  socket.write(
    `POST ${path} HTTP/1.1\r\n${Object.entries(lines)
      .map(([name, value]) => `${name}: ${value}\r\n`)
      .join("")}\r\n`,
  );
  const chunked = "Transfer-Encoding" in headers;
  for (const piece of pieces) {
    if (socket.destroyed) break;
    if (chunked) socket.write(`${piece.byteLength.toString(16)}\r\n`);
    const room = socket.write(piece);
    if (chunked) socket.write("\r\n");
    if (!room) await drained(socket);
  }
  if (hangUp) socket.destroy();
  else if (chunked && !socket.destroyed) socket.write("0\r\n\r\n");
  return answer;
}

function drained(socket: Socket): Promise<void> {
  return new Promise((resolve) => {
    const go = () => {
      socket.off("drain", go);
      socket.off("close", go);
      resolve();
    };
    socket.on("drain", go);
    socket.on("close", go);
  });
}

function collect(socket: Socket): Promise<RawAnswer> {
  let text = "";
  socket.setEncoding("utf8");
  socket.on("data", (piece) => {
    text += piece;
  });
  return new Promise((resolve) => {
    // A reset shows as an answer without a status.
    socket.on("error", () => undefined);
    socket.on("close", () => {
      const status = /^HTTP\/1\.1 (\d{3})/.exec(text)?.[1];
      resolve({
        status: status === undefined ? null : Number(status),
        body: text.slice(text.indexOf("\r\n\r\n") + 4),
      });
    });
  });
}
