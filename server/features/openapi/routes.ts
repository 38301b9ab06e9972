import { createHash } from 'node:crypto';
import { Router } from 'express';
import { cookieName } from '../../auth/session-token.ts';
import { tokenSettings } from '../../auth/sign-in-state.ts';
import type { Feature } from '../../feature.ts';
import { hasReadableMailbox } from '../../mail/local-mailbox.ts';
import { openApiDocument } from './document.ts';
import { account } from './operations/account.ts';
import { audit } from './operations/audit.ts';
import { boards } from './operations/boards.ts';
import { library } from './operations/library.ts';
import { notices } from './operations/notices.ts';
import { originals } from './operations/originals.ts';
import { limitSets, reviews } from './operations/reviews.ts';
import { mailbox, rendering, service } from './operations/service.ts';
import { invitations, teams } from './operations/teams.ts';

/** GET /openapi.json: the API of this server, as its own contract has it. */
export const openapi: Feature = (deps) => {
  const sections = [
    library,
    originals,
    boards,
    reviews,
    limitSets,
    teams,
    invitations,
    account,
    notices,
    audit,
    rendering,
    service,
    ...(hasReadableMailbox(deps.config) ? [mailbox] : []),
  ];
  const make = () => {
    const document = openApiDocument(sections, { cookieName: cookieName(tokenSettings(deps).secure) });
    const bytes = Buffer.from(JSON.stringify(document));
    return { bytes, etag: `"${createHash('sha256').update(bytes).digest('base64url')}"` };
  };
  // Made when it is first asked for: a start need not wait for it.
  let made: ReturnType<typeof make> | undefined;
  const router = Router();

  router.get('/openapi.json', (_request, response) => {
    made ??= make();
    response
      .set({ ETag: made.etag, 'Cache-Control': 'no-cache, no-transform' })
      .type('application/json')
      .send(made.bytes);
  });
  return router;
};
