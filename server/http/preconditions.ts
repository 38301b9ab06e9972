import type { Request } from 'express';
import { Problem } from './problem.ts';

/** The strong entity tag (RFC 9110 §8.8.3) of something at a version. */
export const etagOf = (version: number): string => `"${version}"`;

/** What a change demands of the thing it changes. */
export interface Precondition {
  /** Whether the thing at `version` is the one the sender has seen. */
  holds(version: number): boolean;
}

const tagList = /^\s*((W\/)?"[\x21\x23-\x7e\x80-\xff]*"\s*(,\s*|$))+$/;

/**
 * Reads If-Match (RFC 9110 §13.1.1). A change must name the state it was made from; `*` would name none.
 *
 * @throws {Problem} `precondition-required` (428) where it is missing or `*`, `malformed-request` where it is no list of tags
 */
export function preconditionOf(request: Pick<Request, 'headers'>): Precondition {
  const header = request.headers['if-match'];
  if (header === undefined || header.trim() === '*') {
    throw new Problem('precondition-required', {
      detail: 'Send If-Match with the ETag of the state you have seen.',
    });
  }
  if (!tagList.test(header)) {
    throw new Problem('malformed-request', { detail: 'If-Match: not a list of entity tags; allowed: "3"' });
  }
  const tags = new Set(header.split(',').map((tag) => tag.trim()));
  return { holds: (version) => tags.has(etagOf(version)) };
}

/** What a lost race is answered with (412): the state that is there now, so that the sender can show both sides. */
export const lostRace = (current: unknown): Problem =>
  new Problem('precondition-failed', {
    detail: 'It has changed since you opened it; `current` is what it is now.',
    extensions: { current },
  });
