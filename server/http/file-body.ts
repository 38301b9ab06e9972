import express from 'express';
import { originalLimits } from '../../shared/contract/index.ts';

/**
 * Reads the bytes of a file into `request.body`, as they are. Comes before `jsonBody`, which leaves alone what has been
 * read.
 */
export const fileBody = express.raw({
  type: 'application/octet-stream',
  limit: originalLimits.bytes,
  inflate: false,
});
