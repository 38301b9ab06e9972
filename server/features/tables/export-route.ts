import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';
import type { Request, Response, Router } from 'express';
import {
  exportQuerySchema,
  Refusal,
  showValue,
  teamDefaultsSchema,
  type Definition,
  type GeneratedFile,
  type Report,
  type Revision,
} from '../../../shared/contract/index.ts';
import { contentOf, pulsesOptionFor, targetOf, type Target } from '../../../shared/firmware/index.ts';
import { requireTeam, teamOf } from '../../auth/team-scope.ts';
import type { ServerDeps } from '../../feature.ts';
import { parseInput } from '../../http/parse-input.ts';
import { Problem } from '../../http/problem.ts';
import { noRevision } from '../../tables/not-there.ts';
import { numberOf } from '../../tables/revision-number.ts';
import { BoundedCache } from './bounded-cache.ts';
import { findExportable, findExportContent } from './export-queries.ts';
import { unpackCodes } from './stored-codes.ts';

type RevisionRequest = Request<{ team: string; table: string; number: string }>;

/** Bytes of rendered exports that a process keeps. */
const capacity = 32 * 1024 * 1024;

/** An answer as it is sent, with its strong entity tag (RFC 9110 §8.8.3). */
interface Content {
  readonly bytes: Buffer;
  readonly type: string;
  readonly etag: string;
}

interface Rendered {
  readonly files: ReadonlyMap<string, Content>;
  /** All files and the digest, as JSON. */
  readonly whole: Content;
  readonly size: number;
}

/** GET …/export: the files of a saved revision, the same bytes as long as it is asked for in the same way. */
export function addExportRoute(router: Router, { database, jobs }: ServerDeps): void {
  const { db } = database;
  // By digest and options: a digest stands for one definition, its codes and the version of the engine.
  const cache = new BoundedCache<Rendered>(capacity);

  const path = '/teams/:team/tables/:table/revisions/:number/export';
  router.get(path, requireTeam('viewer'), async (request: RevisionRequest, response) => {
    const { teamId } = teamOf(request);
    const { table, number } = request.params;
    const wanted = numberOf(number);
    const revision = wanted && (await findExportable(db, { teamId, slug: table, number: wanted }));
    if (!revision) throw noRevision(table, number);

    const { target, file, ...given } = parseInput(exportQuerySchema, request.query, 'query');
    const described = inTarget(() => targetOf(target));
    const options = {
      ...ownDefaults(described, revision.teamDefaults),
      ...pulsesOptionFor(described, (revision.playback as Revision['playback'])?.pattern),
      ...given,
    };
    const key = `${revision.digest} ${target} ${canonicalize(options)}`;
    const rendered = cache.get(key) ?? (await render(revision.id, revision.digest, target, options));
    cache.set(key, rendered);
    // The state is not in the files, so that their bytes stay the same whatever becomes of the revision.
    response.set('Stepwell-Revision-State', revision.state);
    if (file === undefined) sendContent(response.type('application/json'), rendered.whole);
    else sendFile(response, rendered, file);
  });

  async function render(
    id: number,
    digest: string,
    target: string,
    options: Record<string, unknown>,
  ): Promise<Rendered> {
    const content = await findExportContent(db, id);
    const files = await jobs
      .run('renderRevision', {
        definition: content.definition as Definition,
        codes: unpackCodes(content.codes),
        report: content.report as Report,
        engineVersion: content.engineVersion,
        target,
        options,
      })
      .catch((error: unknown) => {
        throw error instanceof Refusal ? inQuery(error) : error;
      });
    return pack(files, digest);
  }
}

/** Those of the team's defaults that are options of the target. */
function ownDefaults({ options: { shape } }: Target, stored: unknown): Record<string, unknown> {
  const { arrayPrefix, licenceLine } = teamDefaultsSchema.parse(stored);
  return Object.fromEntries(Object.entries({ arrayPrefix, licenceLine }).filter(([name]) => name in shape));
}

const inTarget = <Result>(work: () => Result): Result => {
  try {
    return work();
  } catch (error) {
    throw error instanceof Refusal ? inQuery(error) : error;
  }
};

/** An option is a name of its own in the address; a field of the definition is one of the revision. */
const inQuery = ({ problems }: Refusal) =>
  new Problem('validation', {
    errors: problems.map((problem) => ({
      ...problem,
      path:
        problem.path === 'target'
          ? 'target'
          : /^options\./.test(problem.path)
            ? problem.path.slice(8)
            : `definition.${problem.path}`,
    })),
  });

function pack(files: readonly GeneratedFile[], digest: string): Rendered {
  const contents = new Map(files.map((file) => [file.name, tagged(contentOf(file), file.encoding)]));
  const whole = tagged(Buffer.from(JSON.stringify({ files, digest })), 'utf-8');
  const size = [whole, ...contents.values()].reduce((sum, { bytes }) => sum + bytes.length, 0);
  return { files: contents, whole, size };
}

const tagged = (content: Uint8Array, encoding: GeneratedFile['encoding']): Content => ({
  bytes: Buffer.from(content),
  type: encoding === 'utf-8' ? 'text/plain' : 'application/octet-stream',
  etag: `"${createHash('sha256').update(content).digest('base64url')}"`,
});

function sendFile(response: Response, { files }: Rendered, name: string): void {
  const content = files.get(name);
  if (!content) {
    const allowed = `one of ${[...files.keys()].map((known) => `"${known}"`).join(', ')}`;
    throw new Problem('validation', { errors: [{ path: 'file', value: showValue(name), allowed }] });
  }
  sendContent(response.attachment(name).type(content.type), content);
}

/** A strong tag stands for these very bytes: nothing between here and there may pack them otherwise. */
const sendContent = (response: Response, { bytes, etag }: Content) =>
  response.set({ ETag: etag, 'Cache-Control': 'private, no-cache, no-transform' }).send(bytes);
