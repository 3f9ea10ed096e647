/** A browser's cookie jar without the browser: what somebody may send, and what they get back, byte for byte. */
export class Visitor {
  readonly #origin: string;
  readonly #cookies = new Map<string, string>();

  constructor(origin: string) {
    this.#origin = origin;
  }

  /** Like a page of the server would: cookies, Origin and Sec-Fetch-Site. `headers` replaces what it names. */
  async send(
    path: string,
    init: { method?: string; body?: string; headers?: Record<string, string> } = {},
  ): Promise<Answer> {
    const method = init.method ?? "GET";
    const ours: Record<string, string> =
      method === "GET" ? {} : { Origin: this.#origin, "Sec-Fetch-Site": "same-origin" };
    const response = await fetch(this.#origin + path, {
      method,
      redirect: "manual",
      headers: { Cookie: this.cookieHeader(), ...ours, ...init.headers },
      ...(init.body === undefined ? {} : { body: init.body }),
    });
    this.#keepCookies(response);
    return { status: response.status, headers: response.headers, body: await response.text() };
  }

  /** Signs in as the form does. @returns the status of the attempt and the code of its refusal. */
  async signIn(email: string, password: string): Promise<{ status: number; refusal: string | null }> {
    const { csrfToken }: { csrfToken: string } = JSON.parse((await this.send("/api/auth/csrf")).body);
    const answer = await this.send("/api/auth/callback/credentials", {
      method: "POST",
      headers: { "Content-Type": "application/x-www-form-urlencoded" },
      body: new URLSearchParams({ csrfToken, email, password, json: "true" }).toString(),
    });
    const { url }: { url: string } = JSON.parse(answer.body);
    return { status: answer.status, refusal: new URL(url).searchParams.get("error") };
  }

  /** Calls a server action by its id, from the page at `path`, with these arguments. */
  act(
    path: string,
    actionId: string,
    parameters: readonly unknown[],
    headers: Record<string, string> = {},
  ): Promise<Answer> {
    return this.send(path, {
      method: "POST",
      // How React encodes arguments that are plain JSON.
      body: JSON.stringify(parameters),
      headers: {
        Accept: "text/x-component",
        "Content-Type": "text/plain;charset=UTF-8",
        "Next-Action": actionId,
        ...headers,
      },
    });
  }

  cookieHeader(): string {
    return [...this.#cookies].map(([name, value]) => `${name}=${value}`).join("; ");
  }

  #keepCookies(response: Response): void {
    for (const line of response.headers.getSetCookie()) {
      const [pair = "", ...attributes] = line.split("; ");
      const name = pair.slice(0, pair.indexOf("="));
      const gone = attributes.some((attribute) => /^max-age=0$|^expires=thu, 01 jan 1970/i.test(attribute));
      if (gone) {
        this.#cookies.delete(name);
      } else {
        this.#cookies.set(name, pair.slice(name.length + 1));
      }
    }
  }
}

export interface Answer {
  readonly status: number;
  readonly headers: Headers;
  readonly body: string;
}
