import { randomUUID } from 'node:crypto';

/** One person's browser, as far as the API sees it: the seeder does nothing that a person could not do. */
export class DemoBrowser {
  private readonly cookies = new Map<string, string>();

  constructor(private readonly appUrl: string) {}

  get = <T>(path: string) => this.send<T>('GET', path);
  post = <T>(path: string, body?: object) => this.send<T>('POST', path, body);
  put = <T>(path: string, body: object) => this.send<T>('PUT', path, body);

  /** Upload one file. Gives its id. */
  async upload(
    kind: 'photo' | 'drawing',
    file: { name: string; type: string; bytes: Buffer },
  ): Promise<string> {
    const form = new FormData();
    form.set('kind', kind);
    form.append('files', new Blob([new Uint8Array(file.bytes)], { type: file.type }), file.name);
    const answer = await this.send<{ files: { id: string }[]; refused: { message: string }[] }>(
      'POST',
      '/api/files',
      form,
    );
    const [stored] = answer.files;
    if (stored === undefined)
      throw new Error(`${file.name} was refused: ${answer.refused[0]?.message ?? ''}`);
    return stored.id;
  }

  private async send<T>(method: string, path: string, body?: object): Promise<T> {
    const headers: Record<string, string> = {
      Cookie: [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; '),
    };
    if (method !== 'GET') Object.assign(headers, { 'X-Kerfyard': '1', Origin: this.appUrl });
    if (method === 'POST') headers['Idempotency-Key'] = randomUUID();
    const isForm = body instanceof FormData;
    if (body !== undefined && !isForm) headers['Content-Type'] = 'application/json';
    const init: RequestInit = { method, headers };
    if (body !== undefined) init.body = isForm ? body : JSON.stringify(body);
    const response = await fetch(this.appUrl + path, init);
    for (const line of response.headers.getSetCookie()) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? [];
      if (name !== undefined) this.cookies.set(name, value ?? '');
    }
    const text = await response.text();
    if (!response.ok) throw new Error(`${method} ${path} gave ${response.status}: ${text.slice(0, 600)}`);
    return (text === '' ? undefined : JSON.parse(text)) as T;
  }
}
