import { demoAccounts } from '../demo-accounts.mjs';

interface Answer<T> {
  readonly body: T;
  readonly status: number;
}

/** A demonstration account's browser, as far as HTTP goes: cookies, own origin, and nothing else. */
export class SignedIn {
  private readonly jar = new Map<string, string>();

  private constructor(readonly url: string) {}

  /** Signs an account of scripts/demo-accounts.mjs in. */
  static async as(key: string, url: string): Promise<SignedIn> {
    const account = demoAccounts.find((each) => each.key === key);
    if (!account) throw new Error(`scripts/demo-accounts.mjs has no account '${key}'.`);
    const browser = new SignedIn(url);
    const { body } = await browser.ask<{ csrfToken: string }>('GET', '/api/auth/csrf');
    const form = new URLSearchParams({ csrfToken: body.csrfToken, email: account.email, password: account.password, callbackUrl: url, json: 'true' });
    await browser.send('/api/auth/callback/credentials', { method: 'POST', body: form });
    if (![...browser.jar.keys()].some((name) => name.endsWith('session-token'))) throw new Error(`${account.email} could not sign in.`);
    return browser;
  }

  get cookies(): { name: string; value: string; url: string }[] {
    return [...this.jar].map(([name, value]) => ({ name, value, url: this.url }));
  }

  private async send(path: string, init: RequestInit): Promise<Response> {
    const headers = new Headers(init.headers);
    headers.set('origin', this.url);
    headers.set('cookie', [...this.jar].map(([name, value]) => `${name}=${value}`).join('; '));
    const response = await fetch(new URL(path, this.url), { redirect: 'manual', ...init, headers });
    for (const line of response.headers.getSetCookie()) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? [];
      if (name !== undefined && value !== undefined) this.jar.set(name, value);
    }
    return response;
  }

  /** Asks and reads the whole answer. @throws Error when the answer is not a success. */
  async ask<T>(method: string, path: string, { body, headers = {} }: { body?: unknown; headers?: Record<string, string> } = {}): Promise<Answer<T>> {
    const json = body === undefined ? {} : { body: JSON.stringify(body) };
    const response = await this.send(path, { method, ...json, headers: { 'content-type': 'application/json', ...headers } });
    const text = await response.text();
    if (!response.ok) throw new Error(`${method} ${path} answered ${response.status}: ${text.slice(0, 300)}`);
    return { body: JSON.parse(text) as T, status: response.status };
  }

  /** Loads a page's HTML to its end. @throws Error when the answer is not a success. */
  async load(path: string): Promise<number> {
    const response = await this.send(path, { headers: { accept: 'text/html' } });
    const { length } = await response.text();
    if (response.status !== 200) throw new Error(`GET ${path} answered ${response.status}.`);
    return length;
  }
}
