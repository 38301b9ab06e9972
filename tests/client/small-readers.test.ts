import { describe, expect, test } from 'vitest';
import { teamAmong } from '../../src/api/current-team.ts';
import { readRates, sayTriesLeft, saySeconds } from '../../src/api/rate-standing.ts';
import { sayMoment } from '../../src/components/moment.tsx';
import { sayClient } from '../../src/features/account/say-client.ts';
import { sectionsOf } from '../../src/features/api-page/operations.ts';
import { limitsOf, typeOf } from '../../src/features/api-page/say-schema.ts';
import { linksIn } from '../../src/features/mailbox/links-in.ts';
import { readTags, sayTags } from '../../src/forms/tags-text.ts';
import { openRevisionPath, ownPath, signInPath, tablePath, tablesPath } from '../../src/paths.ts';

describe('RateLimit headers', () => {
  test('are read, several in one', () => {
    expect(readRates('"sign-in-network";r=96;t=900, "sign-in";r=3;t=840')).toEqual([
      { policy: 'sign-in-network', remaining: 96, resetSeconds: 900 },
      { policy: 'sign-in', remaining: 3, resetSeconds: 840 },
    ]);
    expect(readRates(null)).toEqual([]);
    expect(readRates('limit=10, remaining=9')).toEqual([]);
  });

  test('few tries left are told, by the tightest limit', () => {
    const standing = (remaining: number) => ({ policy: 'sign-in', remaining, resetSeconds: 840 });
    expect(sayTriesLeft([standing(96), standing(3)])).toBe(
      '3 more tries are allowed in the next 14 minutes.',
    );
    expect(sayTriesLeft([standing(1)])).toBe('One more try is allowed in the next 14 minutes.');
    for (const rates of [[], [standing(6)], [standing(0)]]) expect(sayTriesLeft(rates)).toBeUndefined();
  });

  test.each([
    [0, '1 second'],
    [1, '1 second'],
    [119, '119 seconds'],
    [120, '2 minutes'],
    [841, '15 minutes'],
    [7200, '2 hours'],
    [86_399, '24 hours'],
  ])('%i seconds are %s', (seconds, words) => expect(saySeconds(seconds)).toBe(words));
});

test('tags are read as they are typed, each once', () => {
  expect(readTags(' Fog,tone ,, fog, Low battery ')).toEqual(['fog', 'tone', 'low battery']);
  expect(readTags(sayTags(['fog', 'tone']))).toEqual(['fog', 'tone']);
  expect(readTags('  ')).toEqual([]);
});

describe('links in a mail', () => {
  const token = 'A'.repeat(43);

  test('lead to this application, whichever name of this machine they have', () => {
    for (const host of ['127.0.0.1:4173', 'localhost:4173', '[::1]:4173']) {
      expect(linksIn(`See:\nhttp://${host}/verify#${token}\nIt works once.`, '4173')).toEqual([
        { text: 'See:\n' },
        { text: `http://${host}/verify#${token}`, path: `/verify#${token}` },
        { text: '\nIt works once.' },
      ]);
    }
  });

  test('elsewhere are text, and so is everything else', () => {
    for (const text of [
      'http://127.0.0.1:9/verify#x',
      'https://elsewhere.example:4173/verify#x',
      'http://127.0.0.1.elsewhere.example:4173/x',
      'javascript:alert(1)',
      '<a href="/x">x</a>',
    ])
      expect(linksIn(text, '4173')).toEqual([{ text }]);
  });

  test('end before the sentence does', () => {
    expect(linksIn('Open http://localhost:4173/sign-in, or not.', '4173')[1]).toEqual({
      text: 'http://localhost:4173/sign-in',
      path: '/sign-in',
    });
  });
});

test('a browser is told by what it calls itself', () => {
  expect(sayClient('Mozilla/5.0 (X11; Linux x86_64) AppleWebKit/537.36 Ketch/9.1 Safari/537.36')).toBe(
    'Ketch, X11; Linux x86_64',
  );
  expect(sayClient('Mozilla/5.0 (Slate; OS 17_0) AppleWebKit/605.1 Version/17.0 Safari/604.1')).toBe(
    'Safari, Slate; OS 17_0',
  );
  expect(sayClient('unknown')).toBe('unknown');
});

test('a moment is told by the clock within a day, else by the date', () => {
  const now = new Date(2026, 11, 1, 12, 0).getTime();
  expect(sayMoment(new Date(2026, 11, 1, 8, 5), now)).toBe('08:05');
  expect(sayMoment(new Date(2026, 10, 30, 20, 0), now)).toBe('20:00 yesterday');
  expect(sayMoment(new Date(2026, 11, 2, 2, 0), now)).toBe('02:00 tomorrow');
  expect(sayMoment(new Date(2026, 10, 3, 2, 0), now)).toBe('3 Nov 2026');
});

test('addresses carry what they are made of, whatever it holds', () => {
  expect(tablesPath('a b', 'tag=fog')).toBe('/teams/a%20b/tables?tag=fog');
  expect(tablePath('t', 'horn/1', 2)).toBe('/teams/t/tables/horn%2F1?revision=2');
  expect(openRevisionPath('t', 'horn', 3)).toBe('/teams/t/tables/horn/revisions/3/bench');
  expect(signInPath('/teams/t?tag=a&sort=snr')).toBe('/sign-in?to=%2Fteams%2Ft%3Ftag%3Da%26sort%3Dsnr');
});

test('only an address of our own is gone on to', () => {
  expect(ownPath('/teams/t?tag=a')).toBe('/teams/t?tag=a');
  for (const foreign of [
    null,
    '',
    'teams',
    '//elsewhere.example',
    '/\\elsewhere.example',
    'https://elsewhere.example',
  ])
    expect(ownPath(foreign)).toBeNull();
});

test('the team in use is the chosen one, else the first', () => {
  const [a, b] = ['a', 'b'].map((slug) => ({ teamSlug: slug, teamName: slug, role: 'viewer' as const }));
  expect(teamAmong([a, b], 'b')).toBe(b);
  expect(teamAmong([a, b], 'gone')).toBe(a);
  expect(teamAmong([], 'a')).toBeUndefined();
});

test('schemas are said in words and limits', () => {
  expect(typeOf({ enum: ['asc', 'desc'] })).toBe('"asc" | "desc"');
  expect(typeOf({ type: 'array' })).toBe('list');
  expect(typeOf({ type: ['string', 'null'], format: 'email' })).toBe('string | null (email)');
  expect(limitsOf({ type: 'integer', minimum: 1, maximum: 65_536, default: 256 })).toBe(
    '1…65,536, default 256',
  );
  expect(limitsOf({ type: 'string', maxLength: 64 })).toBe('≤ 64 characters');
  expect(limitsOf({})).toBe('');
});

test('routes are found by words of method, path and summary', () => {
  const document = {
    info: { title: '', version: '1' },
    tags: [{ name: 'Tables' }, { name: 'Teams' }],
    paths: {
      '/teams/{team}/tables': {
        get: { tags: ['Tables'], summary: 'List tables' },
        post: { tags: ['Tables'], summary: 'Save a table' },
      },
      '/teams': { get: { tags: ['Teams'], summary: 'List teams' } },
    },
  };
  const found = (wanted: string) =>
    sectionsOf(document, wanted).flatMap(({ routes }) =>
      routes.map(({ method, path }) => `${method} ${path}`),
    );
  expect(found('')).toHaveLength(3);
  expect(found('POST tables')).toEqual(['post /teams/{team}/tables']);
  expect(found('list')).toEqual(['get /teams/{team}/tables', 'get /teams']);
  expect(found('nothing like it')).toEqual([]);
});
