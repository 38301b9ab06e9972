import type { z } from 'zod';
import type { Role } from '../../../shared/contract/index.ts';

/** What one route does, as the document describes it. Schemas are those that the routes parse and answer by. */
export interface Operation {
  readonly id: string;
  readonly method: 'get' | 'post' | 'patch' | 'put' | 'delete';
  /** As the router has it: `/teams/:team`. */
  readonly path: string;
  readonly summary: string;
  readonly description?: string;
  /** Who may: anybody, whoever is signed in, or members of the team with this role or one that includes it. */
  readonly access: 'anyone' | 'signed-in' | Role;
  readonly query?: z.ZodObject;
  readonly body?: z.ZodType;
  /** The body is the bytes of a file, application/octet-stream. */
  readonly fileBody?: boolean;
  /** Whether the body may be left out. */
  readonly bodyOptional?: boolean;
  readonly answer: Answer;
  /** Takes If-Match and refuses without (428) or where it is not the state there is (412). */
  readonly conditional?: boolean;
  /** Takes an Idempotency-Key. */
  readonly repeatable?: boolean;
  /** Statuses of refusals beyond those that follow from the above. */
  readonly refusals?: readonly number[];
}

export interface Answer {
  readonly status: 200 | 201 | 202 | 204 | 303;
  readonly description: string;
  readonly schema?: z.ZodType;
  /** Another form of the answer, by its media type. */
  readonly alsoAs?: string;
  /** Its only form, by its media type, where it is no JSON. */
  readonly textAs?: string;
  readonly headers?: readonly ('ETag' | 'Location' | 'Stepwell-Revision-State')[];
  /** Whether If-None-Match is honoured with 304. */
  readonly cacheable?: boolean;
}

/** The operations of one resource. */
export interface Section {
  readonly name: string;
  readonly description: string;
  readonly operations: readonly Operation[];
}
