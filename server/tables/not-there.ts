import { Problem } from '../http/problem.ts';

export const noTable = (slug: string) =>
  new Problem('not-found', { detail: `The team has no table named ${slug}.` });

export const noRevision = (slug: string, number: number | string) =>
  new Problem('not-found', { detail: `The team's table ${slug} has no revision ${number}.` });
