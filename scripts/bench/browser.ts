import http from 'node:http';

/** An answer as read to its last byte. */
export interface Answer {
  readonly status: number;
  readonly headers: http.IncomingHttpHeaders;
  readonly body: Buffer;
  /** From the request to the last byte, milliseconds. */
  readonly milliseconds: number;
}

/** What the framework leaves where a part of a page failed; a part that is drawn in the browser alone is none. */
const FAILED_PART = / data-dgst="(?!"|BAILOUT_TO_CLIENT_SIDE_RENDERING)/;

/** One person's browser, as far as the server can tell: kept connections, cookies, gzip taken. */
export class Browser {
  readonly #base: string;
  readonly #agent = new http.Agent({ keepAlive: true, maxSockets: 16 });
  readonly #cookies = new Map<string, string>();

  /** @param base the address of the server, without a slash at its end */
  constructor(base: string) {
    this.#base = base;
  }

  /** What a request of this browser carries as its Cookie. */
  get cookie(): string {
    return [...this.#cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  }

  request(
    address: string,
    options: { form?: Record<string, string>; acceptEncoding?: 'gzip' | 'identity' } = {},
  ): Promise<Answer> {
    const body = options.form ? new URLSearchParams(options.form).toString() : null;
    const headers: Record<string, string | number> = {
      accept: 'text/html',
      'accept-encoding': options.acceptEncoding ?? 'gzip',
      ...(this.#cookies.size > 0 ? { cookie: this.cookie } : {}),
      ...(body === null
        ? {}
        : {
            'content-type': 'application/x-www-form-urlencoded',
            'content-length': Buffer.byteLength(body),
          }),
    };
    return new Promise((resolve, reject) => {
      const begun = performance.now();
      const request = http.request(
        `${this.#base}${address}`,
        { agent: this.#agent, method: body === null ? 'GET' : 'POST', headers },
        (response) => {
          const parts: Buffer[] = [];
          response.on('data', (part: Buffer) => parts.push(part));
          response.once('error', reject);
          response.once('end', () => {
            const milliseconds = performance.now() - begun;
            this.#keepCookies(response.headers['set-cookie'] ?? []);
            resolve({
              status: response.statusCode ?? 0,
              headers: response.headers,
              body: Buffer.concat(parts),
              milliseconds,
            });
          });
        },
      );
      request.once('error', reject);
      request.end(body ?? undefined);
    });
  }

  #keepCookies(lines: readonly string[]): void {
    for (const line of lines) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? [];
      if (name !== undefined && value !== undefined) this.#cookies.set(name, value);
    }
  }

  /** Signs a person in, as the form of the sign-in page does. */
  async signIn(email: string, password: string): Promise<void> {
    const { body } = await this.request('/api/auth/csrf', { acceptEncoding: 'identity' });
    const { csrfToken } = JSON.parse(body.toString()) as { csrfToken: string };
    await this.request('/api/auth/callback/credentials', {
      form: { csrfToken, email, password, json: 'true' },
    });
    if (![...this.#cookies.keys()].some((name) => name.endsWith('session-token'))) {
      throw new Error(`${email} could not sign in.`);
    }
  }

  /**
   * Asks for a page and checks that it is one.
   * @throws Error when the answer is another than 200, or holds the frame of "not found" or of a failure
   */
  async page(address: string, acceptEncoding: 'gzip' | 'identity' = 'gzip'): Promise<Answer> {
    const answer = await this.request(address, { acceptEncoding });
    if (answer.status !== 200) throw new Error(`${address} answers ${answer.status}.`);
    if (acceptEncoding === 'identity' && FAILED_PART.test(answer.body.toString())) {
      throw new Error(`${address} answers with a page that says it failed.`);
    }
    return answer;
  }

  close(): void {
    this.#agent.destroy();
  }
}
