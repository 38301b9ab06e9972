import { z } from 'zod';
import {
  definitionSchema,
  mailboxMessageSchema,
  mailboxPageSchema,
  mailboxQuerySchema,
  renderAnswerSchema,
  renderRequestSchema,
  reportAnswerSchema,
} from '../../../../shared/contract/index.ts';
import type { Section } from '../operation.ts';

export const rendering: Section = {
  name: 'Rendering',
  description: 'Figures and files of a definition that nobody stores. No account is needed.',
  operations: [
    {
      id: 'report',
      method: 'post',
      path: '/report',
      summary: 'Compute the codes and the report of a definition',
      access: 'anyone',
      body: definitionSchema,
      answer: {
        status: 200,
        description: 'Codes, stored words, report, spectrum',
        schema: reportAnswerSchema,
        headers: ['ETag'],
      },
      refusals: [412],
    },
    {
      id: 'render',
      method: 'post',
      path: '/render',
      summary: 'Export a definition as files',
      access: 'anyone',
      body: renderRequestSchema,
      answer: { status: 200, description: 'The files', schema: renderAnswerSchema, headers: ['ETag'] },
      refusals: [412],
    },
  ],
};

export const service: Section = {
  name: 'Service',
  description: 'About this server.',
  operations: [
    {
      id: 'health',
      method: 'get',
      path: '/health',
      summary: 'Whether the server can do its work',
      access: 'anyone',
      answer: { status: 200, description: 'It can', schema: z.strictObject({ status: z.literal('ok') }) },
      refusals: [503],
    },
    {
      id: 'openapi',
      method: 'get',
      path: '/openapi.json',
      summary: 'This document',
      access: 'anyone',
      answer: {
        status: 200,
        description: 'An OpenAPI 3.1 document',
        schema: z.looseObject({}),
        headers: ['ETag'],
        cacheable: true,
      },
    },
  ],
};

export const mailbox: Section = {
  name: 'Mailbox',
  description: "The readable mailbox: on one's own machine with the private database only.",
  operations: [
    {
      id: 'listMail',
      method: 'get',
      path: '/mailbox',
      summary: 'List mail, newest first',
      access: 'anyone',
      query: mailboxQuerySchema,
      answer: { status: 200, description: 'A page of mail', schema: mailboxPageSchema },
    },
    {
      id: 'readMail',
      method: 'get',
      path: '/mailbox/:id',
      summary: 'Read a mail',
      access: 'anyone',
      answer: { status: 200, description: 'The mail', schema: mailboxMessageSchema },
      refusals: [404],
    },
  ],
};
