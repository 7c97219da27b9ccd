import type { BrowserContext, Page } from 'playwright-core';
import { inject } from 'vitest';
import { visitor } from './browser';

export type DemoPerson = 'lewin' | 'mara' | 'jun' | 'anselm' | 'pia' | 'ines';

export interface SignedIn {
  context: BrowserContext;
  page: Page;
  problems: string[];
  email: string;
  password: string;
  /** The person's own workspaces by the first word of their name, as the API lists them. */
  workspaces: { id: string; name: string; slug: string; role: string }[];
  /** Calls the HTTP API as this person, the way the product's own pages do. */
  call: (
    method: string,
    path: string,
    body?: unknown,
    headers?: Record<string, string>,
  ) => Promise<{ status: number; body: any }>; // eslint-disable-line @typescript-eslint/no-explicit-any -- answers of many routes
}

/** One of the demo's people, signed in, in a browser of their own. */
export async function signedIn(
  who: DemoPerson,
  options: Parameters<typeof visitor>[0] = {},
): Promise<SignedIn> {
  const { baseUrl, people } = inject('product');
  const person = people.find(({ email }) => email.startsWith(`${who}@`));
  if (!person) throw new Error(`the demo has no ${who}`);
  const { context, page, problems } = await visitor(options);
  const origin = new URL(baseUrl).origin;
  const call: SignedIn['call'] = async (method, path, body, headers = {}) => {
    const response = await context.request.fetch(path, {
      method,
      headers: { origin, 'sec-fetch-site': 'same-origin', ...headers },
      ...(body === undefined ? {} : { data: body }),
      maxRedirects: 0,
    });
    const text = await response.text();
    let parsed: unknown = text;
    try {
      parsed = JSON.parse(text);
    } catch {
      // Not JSON: a redirect or a file.
    }
    return { status: response.status(), body: parsed };
  };
  const { email, password } = person;
  const answer = await call('POST', '/api/auth/sign-in/email', { email, password });
  if (answer.status !== 200)
    throw new Error(`${email} could not sign in: ${answer.status} ${JSON.stringify(answer.body)}`);
  const me = await call('GET', '/api/v1/me');
  return { context, page, problems, email, password, workspaces: me.body.workspaces, call };
}

export function workspaceOf(person: SignedIn, name: string): { id: string; slug: string } {
  const found = person.workspaces.find((workspace) => workspace.name.startsWith(name));
  if (!found) throw new Error(`${person.email} does not belong to ${name}`);
  return found;
}
