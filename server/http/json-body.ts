import express, { type RequestHandler } from 'express';
import { limits } from '../../shared/contract/index.ts';
import { Problem } from './problem.ts';

/** Bytes of one JSON request; 65,536 samples with all their digits take 1.3 MB. */
export const jsonLimit = limits.requestBytes;

/** Nesting of one JSON request; what we take nests 12 deep at most, and parsers recurse. */
const depthLimit = 64;

const parser = express.json({ limit: jsonLimit, strict: true, type: 'application/json' });

const hasBody: RequestHandler = (request, _response, next) => {
  const length = request.headers['content-length'];
  const carriesBody =
    request.headers['transfer-encoding'] !== undefined || (length !== undefined && length !== '0');
  if (carriesBody && request.body === undefined && !request.is('application/json')) {
    throw new Problem('unsupported-media-type', {
      detail: `${request.headers['content-type'] ?? 'A body without Content-Type'} is not taken; send application/json.`,
    });
  }
  next();
};

const depthGate: RequestHandler = (request, _response, next) => {
  const body: unknown = request.body;
  // A file's bytes were read before; they nest nowhere.
  if (!Buffer.isBuffer(body) && isDeeperThan(body, depthLimit)) {
    throw new Problem('validation', {
      errors: [
        {
          path: 'body',
          value: 'deeper nesting',
          allowed: `lists and objects nested at most ${depthLimit} deep`,
        },
      ],
    });
  }
  next();
};

/** Level by level, not by recursion: the input may be made to exhaust the stack. */
function isDeeperThan(value: unknown, limit: number): boolean {
  let level = [value];
  for (let depth = 0; level.length > 0; depth++) {
    if (depth > limit) return true;
    const below: unknown[] = [];
    for (const item of level) {
      if (typeof item !== 'object' || item === null) continue;
      for (const inner of Object.values(item))
        if (typeof inner === 'object' && inner !== null) below.push(inner);
    }
    level = below;
  }
  return false;
}

/** Reads a JSON body of bounded size and depth; any other content is refused (415). What reads another comes before it. */
export const jsonBody: RequestHandler[] = [hasBody, parser, depthGate];
