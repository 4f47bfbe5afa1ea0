/** A browser as far as the API can tell: it keeps cookies by path and says where its requests come from. */
export interface Answer<Body = Record<string, unknown>> {
  readonly status: number;
  readonly headers: Headers;
  readonly body: Body;
  readonly bytes: Uint8Array;
}

interface Cookie {
  value: string;
  path: string;
  attributes: string;
}

export class Client {
  readonly cookies = new Map<string, Cookie>();

  constructor(
    readonly url: string,
    private readonly headers: Record<string, string> = {},
  ) {}

  get = <Body = Record<string, unknown>>(path: string, headers?: Record<string, string>) =>
    this.send<Body>('GET', path, undefined, headers);
  post = <Body = Record<string, unknown>>(path: string, body?: unknown, headers?: Record<string, string>) =>
    this.send<Body>('POST', path, body, headers);
  patch = <Body = Record<string, unknown>>(path: string, body: unknown, version?: number) =>
    this.send<Body>('PATCH', path, body, version === undefined ? {} : { 'if-match': `"${version}"` });
  delete = <Body = Record<string, unknown>>(path: string, version?: number) =>
    this.send<Body>('DELETE', path, undefined, version === undefined ? {} : { 'if-match': `"${version}"` });

  /** `body`: a FormData is sent as it is, anything else as JSON. */
  async send<Body = Record<string, unknown>>(
    method: string,
    path: string,
    body?: unknown,
    headers: Record<string, string> = {},
  ): Promise<Answer<Body>> {
    const given: Record<string, string> = { origin: this.url, ...this.headers, ...headers };
    const cookie = this.cookieHeader(path);
    if (cookie !== '') given.cookie = cookie;
    const isForm = body instanceof FormData;
    const isJson = body !== undefined && !isForm;
    if (isJson) given['content-type'] ??= 'application/json';
    const payload = isForm ? body : typeof body === 'string' ? body : isJson ? JSON.stringify(body) : undefined;
    const answer = await fetch(`${this.url}${path}`, {
      method,
      headers: given,
      redirect: 'manual',
      ...(payload !== undefined && { body: payload }),
    });
    this.keepCookies(answer.headers.getSetCookie());
    const bytes = new Uint8Array(await answer.arrayBuffer());
    const isJsonAnswer = /json/.test(answer.headers.get('content-type') ?? '');
    const parsed = isJsonAnswer ? JSON.parse(new TextDecoder().decode(bytes)) : {};
    return { status: answer.status, headers: answer.headers, body: parsed as Body, bytes };
  }

  /** Only the status: also of an answer that never ends, such as a stream of events. */
  async status(method: string, path: string): Promise<number> {
    const leave = new AbortController();
    const headers = { origin: this.url, ...this.headers, cookie: this.cookieHeader(path) };
    const answer = await fetch(`${this.url}${path}`, { method, headers, signal: leave.signal });
    leave.abort();
    return answer.status;
  }

  private cookieHeader(path: string): string {
    const sent = [...this.cookies].filter(([, cookie]) => path.startsWith(cookie.path));
    return sent.map(([name, cookie]) => `${name}=${cookie.value}`).join('; ');
  }

  private keepCookies(lines: string[]): void {
    for (const line of lines) {
      const [, name = '', value = '', attributes = ''] = /^([^=]+)=([^;]*)(.*)$/.exec(line) ?? [];
      const path = /path=([^;]+)/i.exec(attributes)?.[1] ?? '/';
      if (value === '') this.cookies.delete(name);
      else this.cookies.set(name, { value, path, attributes });
    }
  }
}
