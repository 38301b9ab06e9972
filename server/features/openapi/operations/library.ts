import {
  changeTableSchema,
  createRevisionSchema,
  createTableSchema,
  duplicateTableSchema,
  exportQuerySchema,
  libraryTableSchema,
  renderAnswerSchema,
  revisionSchema,
  revisionsPageSchema,
  revisionsQuerySchema,
  tablesPageSchema,
  tablesQuerySchema,
  tagsListSchema,
} from '../../../../shared/contract/index.ts';
import { exportOptions, targetField } from '../export-options.ts';
import type { Answer, Operation, Section } from '../operation.ts';

const table: Answer = {
  status: 200,
  description: 'The table as it is now',
  schema: libraryTableSchema,
  headers: ['ETag'],
};
const newTable: Answer = {
  ...table,
  status: 201,
  description: 'The new table',
  headers: ['ETag', 'Location'],
};

const putAway = (id: string, action: string, summary: string): Operation => ({
  id,
  method: 'post',
  path: `/teams/:team/tables/:table/${action}`,
  summary,
  access: 'author',
  repeatable: true,
  answer: table,
});

export const library: Section = {
  name: 'Tables',
  description:
    'The library of a team: tables, their revisions, which never change, and what is exported from them.',
  operations: [
    {
      id: 'listTables',
      method: 'get',
      path: '/teams/:team/tables',
      summary: 'List and search tables',
      description: 'A `nextCursor` is good for the same filters and order only.',
      access: 'viewer',
      query: tablesQuerySchema,
      answer: {
        status: 200,
        description: 'A page of tables with their newest revisions',
        schema: tablesPageSchema,
      },
    },
    {
      id: 'createTable',
      method: 'post',
      path: '/teams/:team/tables',
      summary: 'Save a definition as a new table',
      description: 'The server computes codes and report itself and stores them as revision 1.',
      access: 'author',
      body: createTableSchema,
      repeatable: true,
      answer: newTable,
      refusals: [409],
    },
    {
      id: 'readTable',
      method: 'get',
      path: '/teams/:team/tables/:table',
      summary: 'Read a table with its newest revisions',
      access: 'viewer',
      answer: { ...table, cacheable: true },
    },
    {
      id: 'changeTable',
      method: 'patch',
      path: '/teams/:team/tables/:table',
      summary: "Change a table's title or tags; its address stays",
      access: 'author',
      body: changeTableSchema,
      conditional: true,
      answer: table,
    },
    putAway('archiveTable', 'archive', 'Put a table away'),
    putAway('restoreTable', 'restore', 'Put an archived table back'),
    {
      id: 'duplicateTable',
      method: 'post',
      path: '/teams/:team/tables/:table/duplicate',
      summary: 'Make a new table of a revision of this one',
      access: 'author',
      body: duplicateTableSchema,
      bodyOptional: true,
      repeatable: true,
      answer: newTable,
      refusals: [409],
    },
    {
      id: 'listRevisions',
      method: 'get',
      path: '/teams/:team/tables/:table/revisions',
      summary: 'List the revisions of a table, newest first',
      access: 'viewer',
      query: revisionsQuerySchema,
      answer: { status: 200, description: 'A page of revisions', schema: revisionsPageSchema },
    },
    {
      id: 'createRevision',
      method: 'post',
      path: '/teams/:team/tables/:table/revisions',
      summary: 'Save a definition as the next revision of a table',
      access: 'author',
      body: createRevisionSchema,
      conditional: true,
      repeatable: true,
      answer: {
        ...newTable,
        description: 'The table with its new revision; Location is that of the revision',
      },
      refusals: [409],
    },
    {
      id: 'readRevision',
      method: 'get',
      path: '/teams/:team/tables/:table/revisions/:number',
      summary: 'Read a revision with its definition, codes and report',
      access: 'viewer',
      answer: { status: 200, description: 'The revision', schema: revisionSchema },
    },
    {
      id: 'exportRevision',
      method: 'get',
      path: '/teams/:team/tables/:table/revisions/:number/export',
      summary: 'Export a revision as files',
      description:
        "Made from what was stored. The team's array prefix and licence line hold where they are not given, and so do " +
        'the pulses of its playback; `pulses=none` leaves them out. ' +
        'With `file` the answer is that file alone, as an attachment.',
      access: 'viewer',
      query: exportQuerySchema.extend({ ...exportOptions, target: targetField }),
      answer: {
        status: 200,
        description: 'The files, the same bytes for the same request',
        schema: renderAnswerSchema,
        alsoAs: 'text/plain',
        headers: ['ETag', 'Stepwell-Revision-State'],
        cacheable: true,
      },
    },
    {
      id: 'listTags',
      method: 'get',
      path: '/teams/:team/tags',
      summary: 'List the tags in use',
      access: 'viewer',
      answer: { status: 200, description: 'Tags with how many tables have each', schema: tagsListSchema },
    },
  ],
};
