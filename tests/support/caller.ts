import request, { type Test } from 'supertest';

/**
 * One browser's worth of requests: keeps the cookies and sends the CSRF token with each write. Paths are those
 * below /api/v1.
 */
export class Caller {
  readonly #agent: ReturnType<typeof request.agent>;
  csrfToken = '';

  constructor(address: string) {
    this.#agent = request.agent(address);
  }

  get(path: string): Test {
    return this.#agent.get(`/api/v1${path}`);
  }
  post(path: string, body?: object): Test {
    return this.#write(this.#agent.post(`/api/v1${path}`), body);
  }
  put(path: string, body?: object): Test {
    return this.#write(this.#agent.put(`/api/v1${path}`), body);
  }
  patch(path: string, body?: object): Test {
    return this.#write(this.#agent.patch(`/api/v1${path}`), body);
  }
  delete(path: string): Test {
    return this.#write(this.#agent.delete(`/api/v1${path}`));
  }

  /** Asks for a session and its token, as a page does when it opens. */
  async open(): Promise<void> {
    const { body } = await this.get('/session').expect(200);
    this.csrfToken = body.csrfToken;
  }

  async signIn(email: string, password: string): Promise<void> {
    await this.open();
    await this.post('/session', { email, password }).expect((response) => {
      if (response.status >= 300) throw new Error(`Sign-in answered ${response.status}: ${response.text}`);
    });
    await this.open();
  }

  /** The cookies as a header, for requests that supertest cannot make, such as a stream that does not end. */
  cookieHeader(): string {
    const everything = { domain: '127.0.0.1', path: '/', secure: false, script: false };
    return this.#agent.jar.getCookies(everything).toValueString();
  }

  #write(test: Test, body?: object): Test {
    const withToken = test.set('X-CSRF-Token', this.csrfToken);
    return body ? withToken.send(body) : withToken;
  }
}
