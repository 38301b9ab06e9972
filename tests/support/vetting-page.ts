import {
  expect,
  type APIRequestContext,
  type Browser,
  type BrowserContext,
  type Page,
} from '@playwright/test';
import { hear, join, makePerson, makeTeam, post, signIn, type BrowserPerson } from './library-page.ts';

const origin = () => process.env.STEPWELL_TEST_ADDRESS ?? '';

/** Somebody at a browser of their own. */
export interface Mate {
  readonly person: BrowserPerson;
  readonly context: BrowserContext;
  readonly page: Page;
}

export type CrewRole = 'admin' | 'author' | 'reviewer' | 'viewer';

const names: Readonly<Record<string, string>> = {
  admin: 'Ada Keel',
  author: 'Aldo Brine',
  reviewer: 'Rhea Sound',
  viewer: 'Vera Quill',
  second: 'Sten Lode',
};

/** One person for each role asked for, all in one team, each with a browser of their own that must not complain. */
export async function makeCrew<Role extends string>(
  browser: Browser,
  quiet: string[],
  roles: Readonly<Record<Role, CrewRole>>,
) {
  const seat = async (key: string): Promise<Mate> => {
    const context = await browser.newContext();
    hear(context, quiet);
    const person = await makePerson(context.request, names[key]);
    await signIn(context, person);
    return { person, context, page: await context.newPage() };
  };
  const crew: Record<string, Mate> = { admin: await seat('admin') };
  const team = await makeTeam(crew.admin.context.request, 'Ninth Fathom');
  for (const [key, role] of Object.entries<CrewRole>(roles)) {
    if (key === 'admin') continue;
    crew[key] = await seat(key);
    const { person, context } = crew[key];
    await join(crew.admin.context.request, team, person, role, context.request);
  }
  const close = async () => {
    for (const { context } of Object.values(crew)) await context.close();
  };
  return { team, close, ...(crew as Record<Role | 'admin', Mate>) };
}

const revisionPath = (team: string, slug: string, number: number) =>
  `/teams/${team}/tables/${slug}/revisions/${number}`;

export const submit = (request: APIRequestContext, team: string, slug: string, number = 1) =>
  post(request, `${revisionPath(team, slug, number)}/submit`, { message: 'Please look at the level.' });

/** Sends what changes a review, from the state that it has now. */
export async function decide(
  request: APIRequestContext,
  team: string,
  slug: string,
  number: number,
  body: object,
  how: 'verdict' | 'withdraw' = 'verdict',
): Promise<void> {
  const path = revisionPath(team, slug, number);
  const review = await request.get(`${origin()}/api/v1${path}/review`);
  expect(review.ok()).toBe(true);
  await post(request, `${path}/${how}`, body, { 'If-Match': review.headers().etag });
}
