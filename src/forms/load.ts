import { redirect, type LoaderFunctionArgs } from 'react-router-dom';
import { ProblemError } from '../api/problem-error.ts';
import { signInPath } from '../paths.ts';

/**
 * Waits for what a place cannot be shown without. Whoever is not signed in is sent to sign in, and comes back.
 *
 * @throws a redirect, or what kept the content away
 */
export async function load<Data>(
  { request }: Pick<LoaderFunctionArgs, 'request'>,
  content: Promise<Data>,
): Promise<Data> {
  try {
    return await content;
  } catch (error) {
    if (!(error instanceof ProblemError) || error.status !== 401) throw error;
    const { pathname, search } = new URL(request.url);
    throw redirect(signInPath(pathname + search));
  }
}
