import { randomUUID } from 'node:crypto';

type Json = Record<string, unknown>;

/** Someone at a browser, without the browser: keeps the cookie and sends the page's token. */
export class DemoVisitor {
  readonly #origin: string;
  #cookie = '';
  #token = '';

  constructor(origin: string) {
    this.#origin = origin;
  }

  async #call(
    method: string,
    path: string,
    body: BodyInit | undefined,
    headers: Record<string, string>,
  ): Promise<Json> {
    const answer = await fetch(`${this.#origin}${path}`, {
      method,
      headers: { Cookie: this.#cookie, 'X-CSRF-Token': this.#token, ...headers },
      ...(body === undefined ? {} : { body }),
    });
    const cookie = answer.headers.getSetCookie()[0];
    if (cookie !== undefined) this.#cookie = cookie.split(';')[0]!;
    const text = await answer.text();
    if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status} ${text.slice(0, 2000)}`);
    return text === '' ? {} : (JSON.parse(text) as Json);
  }

  async signIn(email: string, password: string): Promise<void> {
    this.#token = String((await this.get('/api/v1/session')).csrfToken);
    await this.post('/api/v1/session', { email, password });
    this.#token = String((await this.get('/api/v1/session')).csrfToken);
  }

  get(path: string): Promise<Json> {
    return this.#call('GET', path, undefined, {});
  }

  post(path: string, body: object = {}): Promise<Json> {
    const headers = { 'Content-Type': 'application/json', 'Idempotency-Key': randomUUID() };
    return this.#call('POST', path, JSON.stringify(body), headers);
  }

  put(path: string, body: object): Promise<Json> {
    return this.#call('PUT', path, JSON.stringify(body), { 'Content-Type': 'application/json' });
  }

  upload(path: string, name: string, mediaType: string, content: Buffer): Promise<Json> {
    const form = new FormData();
    form.append('file', new Blob([new Uint8Array(content)], { type: mediaType }), name);
    return this.#call('POST', path, form, {});
  }
}
