import {
  originalQuerySchema,
  originalSchema,
  originalsListSchema,
} from '../../../../shared/contract/index.ts';
import type { Section } from '../operation.ts';

const path = '/teams/:team/tables/:table/revisions/:number/originals';

export const originals: Section = {
  name: 'Originals',
  description: 'The files that revisions were made from: recordings, columns of numbers, source with arrays.',
  operations: [
    {
      id: 'listOriginals',
      method: 'get',
      path,
      summary: 'List the originals of a revision',
      access: 'viewer',
      answer: { status: 200, description: 'Originals and the room they take', schema: originalsListSchema },
    },
    {
      id: 'keepOriginal',
      method: 'post',
      path,
      summary: 'Keep a file with a revision',
      description:
        'The body is the bytes of the file, of a kind that a table can be made from. The same bytes once more answer 200 with the file that is kept.',
      access: 'author',
      query: originalQuerySchema,
      fileBody: true,
      repeatable: true,
      answer: { status: 201, description: 'The original', schema: originalSchema, headers: ['Location'] },
      refusals: [409],
    },
    {
      id: 'fetchOriginal',
      method: 'get',
      path: `${path}/:id`,
      summary: 'Fetch an original, as an attachment',
      access: 'viewer',
      answer: { status: 200, description: 'The file as it came', textAs: 'application/octet-stream' },
    },
    {
      id: 'removeOriginal',
      method: 'delete',
      path: `${path}/:id`,
      summary: 'Remove an original',
      access: 'admin',
      answer: { status: 204, description: 'It is gone' },
    },
  ],
};
