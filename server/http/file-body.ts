import express, { type RequestHandler } from 'express';
import { originalLimits } from '../../shared/contract/index.ts';

const read = express.raw({ type: 'application/octet-stream', limit: originalLimits.bytes, inflate: false });

/**
 * Reads the bytes of a file into `request.body`, as they are, at the addresses that take one. Comes before `jsonBody`,
 * which leaves alone what has been read.
 */
export const fileBody: RequestHandler = (request, response, next) =>
  request.method === 'POST' && request.path.endsWith('/originals') ? read(request, response, next) : next();
