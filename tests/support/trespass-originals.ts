import { asPerson } from './people.ts';
import { freshTable, type RouteCase, type Target } from './trespass-routes.ts';

const asFile = { 'Content-Type': 'application/octet-stream' };
const file = () => Buffer.from('1\n2\n3\n');

const originalsOf = async (target: Target) =>
  `/teams/${target.team.slug}/tables/${await freshTable(target)}/revisions/1/originals`;

/** A new original of a new table's first revision; answers its address. */
async function freshOriginal(target: Target): Promise<string> {
  const path = await originalsOf(target);
  const response = await asPerson(target.test, target.admin)
    .post(`${path}?name=old.csv`)
    .set(asFile)
    .send(file());
  if (response.status !== 201) throw new Error(response.text);
  return `${path}/${response.body.id}`;
}

const path = '/teams/:team/tables/:table/revisions/:number/originals';

/** The routes of the files that revisions were made from. */
export const originalCases: Readonly<Record<string, RouteCase>> = {
  [`GET ${path}`]: {
    access: 'viewer',
    attempt: async (target) => ({ path: await originalsOf(target), status: 200 }),
  },
  [`POST ${path}`]: {
    access: 'author',
    attempt: async (target) => ({
      path: `${await originalsOf(target)}?name=old.csv`,
      body: file(),
      headers: asFile,
      status: 201,
    }),
  },
  [`GET ${path}/:id`]: {
    access: 'viewer',
    attempt: async (target) => ({ path: await freshOriginal(target), status: 200 }),
  },
  [`DELETE ${path}/:id`]: {
    access: 'admin',
    attempt: async (target) => ({ path: await freshOriginal(target), status: 204 }),
  },
};
