import { describe, expect, it } from 'vitest';
import { auditActions, type AuditEvent } from '../../shared/contract/index.ts';
import { actionOptions } from '../../src/features/audit/action-options.ts';
import { changedQuery, readAuditQuery } from '../../src/features/audit/audit-query.ts';
import { sayEvent } from '../../src/features/audit/words.ts';

const event = (action: string, subject: string, details: AuditEvent['details'] = {}): AuditEvent => ({
  sequence: 1,
  at: '2026-03-31T12:00:00.000Z',
  actor: { id: 7, name: 'Rhea Sound' },
  action,
  subject,
  details,
});
const said = (...of: Parameters<typeof event>) => {
  const { words, thing, after } = sayEvent(event(...of));
  return [words, thing, after].filter((part) => part !== undefined).join(' ');
};

describe('what an event says', () => {
  it.each([
    ['team.created', 'team:ninth-fathom', { name: 'Ninth Fathom' }, 'made the team Ninth Fathom'],
    [
      'team.changed',
      'team:x',
      { name: 'X', twoPersonRule: false },
      'changed the team: its name, its two-person rule',
    ],
    [
      'member.role-changed',
      'member:9',
      { name: 'Vera', from: 'viewer', to: 'author' },
      'made Vera author, who was viewer',
    ],
    ['member.left', 'member:9', { accountDeleted: true }, 'deleted their account, and so left the team'],
    [
      'table.changed',
      'table:x',
      { before: { title: 'X' }, after: { title: 'Y' } },
      'renamed the table X to Y',
    ],
    [
      'table.changed',
      'table:x',
      { before: { title: 'X' }, after: { title: 'X' } },
      'changed the tags of the table X',
    ],
    ['table.archived', 'table:fog-signal', {}, 'archived the table fog-signal'],
    [
      'table.duplicated',
      'table:y',
      { title: 'Y', from: { slug: 'x', number: 2 } },
      'made the table Y out of revision 2 of x',
    ],
    ['revision.saved', 'table:fog-signal', { number: 3 }, 'saved revision 3 of fog-signal'],
    ['revision.vetted', 'table:x', { number: 3, title: 'Fog signal' }, 'vetted revision 3 of Fog signal'],
    ['comment.added', 'table:x', { number: 3, title: 'Fog signal' }, 'commented on revision 3 of Fog signal'],
    ['limits.changed', 'limits:fog', {}, 'changed the limits for tables tagged fog'],
    ['board.revised', 'board:buoy', { number: 2, name: 'Buoy' }, 'saved revision 2 of the board Buoy'],
    ['board.retired', 'board:buoy', {}, 'retired the board buoy'],
    ['bundle.released', 'bundle:buoy', {}, 'bundle.released: buoy'],
  ])('%s of %s', (action, subject, details, words) => {
    expect(said(action, subject, details)).toBe(words);
  });

  it('is something for every action there is, even where details are missing', () => {
    for (const action of auditActions) {
      const words = said(action, 'thing:name');
      expect(words, action).toMatch(/^[a-z]/);
      expect(words, action).not.toMatch(/undefined|\[object/);
    }
  });
});

it('offers every action, and each kind of several as a whole', () => {
  const values = actionOptions.map(({ value }) => value);
  expect(new Set(values).size).toBe(values.length);
  expect(values).toEqual(
    expect.arrayContaining([...auditActions, 'revision.', 'table.', 'member.', 'limits.']),
  );
  expect(new Set(actionOptions.map(({ label }) => label)).size).toBe(values.length);
});

describe('the query of the audit trail', () => {
  it('takes from an address what the API takes, and leaves the rest out', () => {
    const read = (text: string) => readAuditQuery(new URLSearchParams(text));
    expect(read('actor=7&action=revision.&subject=table:x&from=2026-03-01&to=2026-03-31&cursor=abc')).toEqual(
      {
        actor: '7',
        action: 'revision.',
        subject: 'table:x',
        from: '2026-03-01',
        to: '2026-03-31',
        cursor: 'abc',
      },
    );
    expect(read('actor=me&action=X&from=soon&to=2026-02-30&subject=&colour=red')).toEqual({});
  });

  it('loses its page and nothing else where a filter changes', () => {
    const query = { actor: '7', cursor: 'abc' };
    expect(changedQuery(query, { action: 'table.' })).toEqual({ actor: '7', action: 'table.' });
    expect(changedQuery(query, { actor: '' })).toEqual({});
  });
});
