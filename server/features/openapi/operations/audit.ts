import { auditFiltersSchema, auditPageSchema, auditQuerySchema } from '../../../../shared/contract/index.ts';
import type { Section } from '../operation.ts';

export const audit: Section = {
  name: 'Audit trail',
  description: 'Who did what when, in a team. Each event is chained to the one before it.',
  operations: [
    {
      id: 'listAuditEvents',
      method: 'get',
      path: '/teams/:team/audit',
      summary: 'List events, newest first',
      description: 'A `nextCursor` is good for the same filters only.',
      access: 'reviewer',
      query: auditQuerySchema,
      answer: { status: 200, description: 'A page of events', schema: auditPageSchema },
    },
    {
      id: 'exportAuditEvents',
      method: 'get',
      path: '/teams/:team/audit.csv',
      summary: 'Export all events of the filters as CSV, newest first',
      description:
        'RFC 4180, UTF-8. A text cell that begins with `=`, `+`, `-`, `@`, a tab or a carriage return gets an ' +
        'apostrophe before it, so that no spreadsheet takes it for a formula.',
      access: 'reviewer',
      query: auditFiltersSchema,
      answer: { status: 200, description: 'The events', textAs: 'text/csv' },
    },
  ],
};
