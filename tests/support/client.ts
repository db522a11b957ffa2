import type { StartingPoint } from '../../shared/contracts/api';

/** A person's way to the API from outside the browser: keeps the session cookie, sends the Origin of the page. */
export class Client {
  readonly #address: string;
  #cookie = '';

  constructor(address: string) {
    this.#address = address;
  }

  /** The session cookie as `name=value`, for a browser that goes on with the same session. */
  get cookie(): string {
    return this.#cookie;
  }

  async send(method: string, path: string, body?: unknown, headers: Record<string, string> = {}): Promise<Response> {
    const answer = await fetch(this.#address + path, {
      method,
      headers: {
        origin: this.#address,
        ...(this.#cookie && { cookie: this.#cookie }),
        ...(body !== undefined && { 'content-type': 'application/json' }),
        ...headers,
      },
      ...(body !== undefined && { body: JSON.stringify(body) }),
    });
    const given = answer.headers.getSetCookie()[0];
    if (given) this.#cookie = given.slice(0, given.indexOf(';'));
    return answer;
  }

  /** Sends and reads the answer as JSON; fails with the server's own words. */
  async json<T>(method: string, path: string, body?: unknown): Promise<T> {
    const answer = await this.send(method, path, body);
    if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status} ${await answer.text()}`);
    return (await answer.json()) as T;
  }

  /** Opens a trial and in it a production from a starting point (the first one is the demo); gives the production's id. */
  async openTrial(startingPoint?: string): Promise<string> {
    await this.json('POST', '/api/session/trial');
    startingPoint ??= (await this.json<StartingPoint[]>('GET', '/api/starting-points'))[0]?.slug;
    const { id } = await this.json<{ id: string }>('POST', '/api/productions', { from: startingPoint });
    return id;
  }
}
