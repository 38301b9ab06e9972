import { createHash } from 'node:crypto';
import { Router, type Request } from 'express';
import { originalLimits, originalQuerySchema } from '../../../shared/contract/index.ts';
import { requireTeam, teamOf } from '../../auth/team-scope.ts';
import type { Executor } from '../../db/client.ts';
import { withTransaction } from '../../db/transaction.ts';
import type { Feature } from '../../feature.ts';
import { answerOnce } from '../../http/idempotency.ts';
import { parseInput } from '../../http/parse-input.ts';
import { Problem } from '../../http/problem.ts';
import { noRevision } from '../../tables/not-there.ts';
import { numberOf } from '../../tables/revision-number.ts';
import { keepUpload, noUpload, removeUpload, type Command } from './commands.ts';
import { presentUpload } from './presenter.ts';
import { bytesOfTeam, findContent, findRevisionId, listUploads } from './queries.ts';

type RevisionRequest = Request<{ team: string; table: string; number: string }>;
type UploadRequest = Request<{ team: string; table: string; number: string; id: string }>;

/** The files that revisions were made from: kept as they came, given out as attachments only. */
export const uploads: Feature = ({ config, database, jobs }) => {
  const { db } = database;
  const router = Router();
  const path = '/teams/:team/tables/:table/revisions/:number/originals';

  const revisionOf = async (request: RevisionRequest): Promise<{ number: number; revisionId: number }> => {
    const { table, number } = request.params;
    const wanted = numberOf(number);
    const revisionId = wanted && (await findRevisionId(db, teamOf(request).teamId, table, wanted));
    if (!wanted || !revisionId) throw noRevision(table, number);
    return { number: wanted, revisionId };
  };
  const commandOf = (request: RevisionRequest, number: number, transaction: Executor): Command => ({
    transaction,
    auditKey: config.auditKey,
    scope: teamOf(request),
    slug: request.params.table,
    number,
  });

  router.get(path, requireTeam('viewer'), async (request: RevisionRequest, response) => {
    const { teamId } = teamOf(request);
    const { revisionId } = await revisionOf(request);
    response.json({
      items: (await listUploads(db, teamId, revisionId)).map(presentUpload),
      teamBytes: await bytesOfTeam(db, teamId),
      teamBytesAtMost: originalLimits.teamBytes,
    });
  });

  router.post(path, requireTeam('author'), async (request: RevisionRequest, response) => {
    const { number } = await revisionOf(request);
    const { name } = parseInput(originalQuerySchema, request.query, 'query');
    const content: unknown = request.body;
    if (!Buffer.isBuffer(content)) {
      throw new Problem('unsupported-media-type', { detail: 'Send the file as application/octet-stream.' });
    }
    const kind = await jobs.run('inspectUpload', { bytes: content, name });
    const sha256 = createHash('sha256').update(content).digest('hex');
    // What a repeated request is known by; the bytes themselves are long.
    request.body = { sha256 };
    await answerOnce(request, response, db, async (transaction) => {
      const command = commandOf(request, number, transaction);
      const { row, isNew } = await keepUpload(command, { name, kind, sha256, content });
      const { team, table } = request.params;
      const Location = `/api/v1/teams/${team}/tables/${table}/revisions/${number}/originals/${row.id}`;
      return { status: isNew ? 201 : 200, headers: { Location }, body: presentUpload(row) };
    });
  });

  router.get(`${path}/:id`, requireTeam('viewer'), async (request: UploadRequest, response) => {
    const { number, revisionId } = await revisionOf(request);
    const id = idOf(request.params.id);
    const file = id === undefined ? undefined : await findContent(db, teamOf(request).teamId, revisionId, id);
    if (!file) throw noUpload(request.params.table, number);
    response
      .attachment(file.name)
      .type('application/octet-stream')
      .set({ 'X-Content-Type-Options': 'nosniff', 'Cache-Control': 'private, no-store, no-transform' })
      .send(file.content);
  });

  router.delete(`${path}/:id`, requireTeam('admin'), async (request: UploadRequest, response) => {
    const { number } = await revisionOf(request);
    await withTransaction(db, (transaction) =>
      removeUpload(commandOf(request, number, transaction), idOf(request.params.id)),
    );
    response.status(204).end();
  });

  return router;
};

const idOf = (text: string) => (/^\d{1,15}$/.test(text) ? Number(text) : undefined);
