import { randomBytes } from 'node:crypto';
import {
  expect,
  test as base,
  type APIRequestContext,
  type BrowserContext,
  type Page,
} from '@playwright/test';
import { waitUntil } from './wait-until.ts';

/** As the bench's own, but for refusals that a test brings about: the browser notes each of them as an error. */
export const test = base.extend<{ quiet: string[] }>({
  quiet: [
    async ({ context }, use) => {
      const complaints: string[] = [];
      hear(context, complaints);
      await use(complaints);
      expect(complaints).toEqual([]);
    },
    { auto: true },
  ],
});

const isRefusal = (text: string) =>
  /^Failed to load resource: (the server responded with a status of 4\d\d|net::ERR_(INTERNET_DISCONNECTED|FAILED))/.test(
    text,
  );

/** Collects what a context's pages complain of, but for refusals. */
export function hear(context: BrowserContext, complaints: string[]): void {
  context.on('console', (message) => {
    const text = message.text();
    if (['error', 'warning'].includes(message.type()) && !isRefusal(text)) complaints.push(text);
  });
  context.on('weberror', (error) => complaints.push(String(error.error())));
}

export interface BrowserPerson {
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

const origin = () => process.env.STEPWELL_TEST_ADDRESS ?? '';

export const freshEmail = (word = 'person') =>
  `${word}-${randomBytes(5).toString('hex')}@ninthfathom.example`;

async function send(request: APIRequestContext, method: string, path: string, data?: object, headers = {}) {
  const response = await request.fetch(`${origin()}/api/v1${path}`, {
    method,
    data,
    headers: { Origin: origin(), ...headers },
  });
  expect(response.ok(), `${method} ${path}: ${response.status()} ${await response.text()}`).toBe(true);
  return response;
}

export const post = (request: APIRequestContext, path: string, data: object, headers = {}) =>
  send(request, 'POST', path, data, headers);

export const remove = (request: APIRequestContext, path: string) => send(request, 'DELETE', path);

export async function read<Answer>(request: APIRequestContext, path: string): Promise<Answer> {
  return (await (await send(request, 'GET', path)).json()) as Answer;
}

/** The newest mail to an address, by what its subject holds; waits until it has come. */
export async function mailTo(request: APIRequestContext, address: string, subject: string): Promise<string> {
  interface Mail {
    id: number;
    to: string;
    subject: string;
  }
  const found = await waitUntil(`a mail to ${address}`, async () => {
    const { items } = await read<{ items: Mail[] }>(request, '/mailbox');
    return items.find((mail) => mail.to === address && mail.subject.includes(subject));
  });
  return (await read<{ text: string }>(request, `/mailbox/${found.id}`)).text;
}

/** Path and fragment of the link in a mail. */
export function linkIn(mail: string): string {
  const found = /https?:\/\/[^/\s]+(\/[\w-]+#[\w-]{43})/.exec(mail);
  if (found === null) throw new Error(`No link in: ${mail}`);
  return found[1];
}

/** An address for documentation only (RFC 3849), as sign-ups and sign-ins are counted by network. */
const freshNetwork = () => `2001:db8:${randomBytes(2).toString('hex')}:${randomBytes(2).toString('hex')}::1`;

/** A person with a verified account, made over the API. */
export async function makePerson(request: APIRequestContext, name: string): Promise<BrowserPerson> {
  const person = { name, email: freshEmail(), password: 'nine fathoms deep' };
  await post(request, '/account/sign-up', person, { 'X-Forwarded-For': freshNetwork() });
  const [, token] = linkIn(await mailTo(request, person.email, 'Verify')).split('#');
  await post(request, '/account/verify-address', { token });
  return person;
}

/** Signs a context in, as the page itself does. */
export async function signIn(context: BrowserContext, { email, password }: BrowserPerson): Promise<void> {
  const csrf = await context.request.get(`${origin()}/auth/csrf`);
  const { csrfToken } = (await csrf.json()) as { csrfToken: string };
  const response = await context.request.post(`${origin()}/auth/callback/credentials`, {
    headers: { Origin: origin(), 'X-Auth-Return-Redirect': '1', 'X-Forwarded-For': freshNetwork() },
    data: { email, password, csrfToken, callbackUrl: `${origin()}/` },
  });
  expect(((await response.json()) as { url: string }).url).not.toContain('error=');
}

export async function makeTeam(request: APIRequestContext, name = 'Ninth Fathom'): Promise<string> {
  const response = await post(request, '/teams', { name });
  return ((await response.json()) as { slug: string }).slug;
}

/** Lets a person into a team, by an invitation that their own context accepts. */
export async function join(
  admin: APIRequestContext,
  team: string,
  person: BrowserPerson,
  role: string,
  own: APIRequestContext,
): Promise<void> {
  await post(admin, `/teams/${team}/invitations`, { email: person.email, role });
  const [, token] = linkIn(await mailTo(admin, person.email, 'Invitation')).split('#');
  await post(own, '/invitations/accept', { token });
}

export interface SavedTable {
  readonly slug: string;
  readonly title: string;
  readonly latestRevision: number;
  readonly version: number;
}

const definitionOf = (name: string, length: number, bits: number) => ({
  schema: 1,
  name,
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table: { length, bits },
});

export async function saveTable(
  request: APIRequestContext,
  team: string,
  title: string,
  { tags = [] as string[], length = 64, bits = 8, note = '' } = {},
): Promise<SavedTable> {
  const definition = definitionOf(title.slice(0, 64), length, bits);
  const response = await post(request, `/teams/${team}/tables`, { title, tags, definition, note });
  return (await response.json()) as SavedTable;
}

export async function saveRevision(
  request: APIRequestContext,
  team: string,
  { slug, version }: Pick<SavedTable, 'slug' | 'version'>,
  { name = 'Revised', length = 64, bits = 8, note = '' } = {},
): Promise<SavedTable> {
  const response = await post(
    request,
    `/teams/${team}/tables/${slug}/revisions`,
    { definition: definitionOf(name, length, bits), note },
    { 'If-Match': `"${version}"` },
  );
  return (await response.json()) as SavedTable;
}

export const readTable = (request: APIRequestContext, team: string, slug: string) =>
  read<SavedTable & { revisions: { number: number; note: string }[] }>(
    request,
    `/teams/${team}/tables/${slug}`,
  );

/** Signs a page in as a new person with a team of their own. */
export async function beginWithTeam(page: Page, name = 'Aldo Brine') {
  const person = await makePerson(page.request, name);
  await signIn(page.context(), person);
  return { person, team: await makeTeam(page.request) };
}

/** Waits until the page knows who is signed in. */
export const isKnown = (page: Page, { name }: BrowserPerson) =>
  expect(page.getByRole('button', { name: `Account of ${name}` })).toBeVisible();
