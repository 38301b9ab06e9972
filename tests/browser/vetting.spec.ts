import { expect, type Page } from '@playwright/test';
import { field, figure, textOf } from '../support/bench-page.ts';
import {
  beginWithTeam,
  mailTo,
  post,
  readTable,
  saveRevision,
  saveTable,
  test,
} from '../support/library-page.ts';
import { decide, makeCrew, submit } from '../support/vetting-page.ts';

const table = (page: Page, name: string) => page.getByRole('table', { name });
const panel = (page: Page, name: string | RegExp) =>
  page.getByRole('region', { name, exact: typeof name === 'string' });

/** Presses what has the name by keys alone. */
async function pressByKey(
  page: Page,
  name: string | RegExp,
  role: 'button' | 'link' = 'button',
): Promise<void> {
  await page
    .getByRole(role, { name, exact: typeof name === 'string' })
    .last()
    .focus();
  await page.keyboard.press('Enter');
}

test('from a draft to a vetted table that is withdrawn, between five people', async ({ browser, quiet }) => {
  test.setTimeout(240_000);
  const { team, admin, author, reviewer, viewer, close } = await makeCrew(browser, quiet, {
    admin: 'admin',
    author: 'author',
    reviewer: 'reviewer',
    viewer: 'viewer',
  });
  const first = await saveTable(author.context.request, team, 'Fog signal', { tags: ['fog'], bits: 8 });
  await submit(author.context.request, team, first.slug);
  await decide(reviewer.context.request, team, first.slug, 1, { verdict: 'vetted' });
  const now = await readTable(author.context.request, team, first.slug);
  await saveRevision(author.context.request, team, now, { name: 'Fog signal', bits: 6, note: 'Fewer pins.' });
  const home = `/teams/${team}/tables/${first.slug}`;

  // An admin sets a limit; a wrong one is told beside its field.
  await admin.page.goto(`/teams/${team}`);
  await pressByKey(admin.page, 'Set limits for a tag');
  const limits = admin.page.getByRole('dialog', { name: 'Limits for the tables of a tag' });
  await limits.getByRole('textbox', { name: 'Tag', exact: true }).fill('fog');
  await limits.getByRole('textbox', { name: 'SNR at least' }).fill('forty');
  await limits.getByRole('button', { name: 'Set these' }).click();
  await expect(limits.getByText('"forty" is not allowed. Allowed: a number from 0 to 200 dB.')).toBeVisible();
  await limits.getByRole('textbox', { name: 'SNR at least' }).fill('60 dB');
  await limits.getByRole('button', { name: 'Set these' }).click();
  await expect(panel(admin.page, 'Limits for vetting')).toContainText('SNR at least 60 dB');

  // The author submits, by keys alone.
  await author.page.goto(home);
  await pressByKey(author.page, 'Submit for review');
  const asking = author.page.getByRole('dialog', { name: 'Submit revision 2 for review' });
  await expect(asking.getByText('The one limit is broken')).toBeVisible();
  await asking.getByRole('textbox').focus();
  await author.page.keyboard.type('Does six bits do for the small buoy?');
  await author.page.keyboard.press('Tab');
  await author.page.keyboard.press('Enter');
  await expect(author.page.getByText('Revision 2 is in review now.')).toBeVisible();
  await expect(author.page.getByRole('link', { name: 'Open review' })).toBeVisible();

  // The reviewer is told by mail and in the header, comments on a setting and returns it with reasons.
  const asked = await mailTo(reviewer.context.request, reviewer.person.email, 'Review asked for: revision 2');
  expect(asked).toContain('Does six bits do for the small buoy?');
  expect(asked).toContain(`/teams/${team}/tables/${first.slug}/revisions/2/review`);
  const judge = reviewer.page;
  await judge.goto('/');
  await pressByKey(judge, 'Reviews 1 waiting for you', 'link');
  await expect(judge.getByRole('tab', { name: 'For me: 1', selected: true })).toBeVisible();
  await expect(judge.getByRole('listitem').filter({ hasText: 'Fog signal' })).toContainText(
    'One limit is broken',
  );
  await pressByKey(judge, 'Fog signal, revision 2', 'link');
  await expect(judge.getByRole('heading', { name: 'What has changed since revision 1' })).toBeVisible();
  await expect(judge.getByRole('row', { name: /^Bit depth/ })).toContainText('8 bits6 bits');
  await expect(judge.getByText('Does six bits do')).toBeVisible();
  await expect(panel(judge, 'The one limit is broken')).toContainText('failed: at least 60 dB, for fog');
  await expect(judge.getByRole('row', { name: /^SNR/ })).toContainText('worse');
  await expect(judge.getByRole('row', { name: /^Size/ })).toContainText('the same');
  await expect(panel(judge, /of 64 codes differ/)).toContainText('in LSB of revision 2');
  await pressByKey(judge, 'Comment on Bit depth');
  await judge.getByRole('textbox', { name: 'Comment on Bit depth' }).fill('Why not ten?');
  await judge.getByRole('form', { name: 'Comment on Bit depth' }).getByRole('button').click();
  await expect(judge.getByRole('list', { name: 'Comments on Bit depth' })).toContainText('Why not ten?');
  await judge.getByRole('radio', { name: 'Return it' }).focus();
  await judge.keyboard.press('Space');
  await pressByKey(judge, 'Return it');
  await expect(judge.getByText('as a return needs its reasons')).toBeVisible();
  await expect(judge.getByRole('textbox', { name: 'Reasons' })).toBeFocused();
  await judge.keyboard.type('It hisses.');
  await judge.reload();
  await expect(judge.getByRole('textbox', { name: 'Reasons' })).toHaveValue('It hisses.');
  await judge.getByRole('radio', { name: 'Return it' }).check();
  await judge.getByRole('button', { name: 'Return it' }).click();
  await expect(panel(judge, 'Returned')).toContainText('Returned by Rhea Sound');
  expect(await mailTo(author.context.request, author.person.email, 'Returned: revision 2')).toContain(
    'It hisses.',
  );

  // The author mends it, which makes the next number.
  await author.page.goto(home);
  await expect(author.page.getByText('It hisses.')).toBeVisible();
  await author.page.getByRole('link', { name: 'Open on the bench', exact: true }).click();
  await expect(author.page.getByText('This is revision 2 of Fog signal')).toBeVisible();
  await author.page.goto('/?open=quantise');
  await expect(author.page.getByText('The one limit is broken')).toBeVisible();
  await field(author.page, 'Bit depth').fill('12');
  await expect(author.page.getByText('The one limit is kept')).toBeVisible();
  await field(author.page, 'Bit depth').fill('9');
  await expect(author.page.getByText('The one limit is broken')).toBeVisible();
  await author.page.getByRole('button', { name: 'Save revision' }).click();
  await author.page.getByRole('dialog').getByRole('button', { name: 'Save', exact: false }).last().click();
  await expect(author.page.getByText('This is revision 3 of Fog signal')).toBeVisible();
  await author.page.goto(home);
  await author.page.getByRole('button', { name: 'Submit for review' }).click();
  await author.page.getByRole('dialog').getByRole('textbox').fill('Nine bits now.');
  await author.page.getByRole('dialog').getByRole('button', { name: 'Submit', exact: true }).click();
  await author.page.getByRole('link', { name: 'Open review' }).click();
  await expect(panel(author.page, 'Verdict')).toContainText('Judging takes the role reviewer.');

  // Vetting against a broken limit takes a reason.
  await judge.goto(`${home}/revisions/3/review`);
  await judge.getByRole('radio', { name: 'Vet it' }).check();
  await judge.getByRole('button', { name: 'Vet it' }).click();
  await expect(judge.getByText('as a limit is broken')).toBeVisible();
  await judge.getByRole('textbox', { name: 'Reasons' }).fill('The siren drowns it.');
  await judge.getByRole('button', { name: 'Vet it' }).click();
  await expect(panel(judge, 'Vetted')).toContainText('The siren drowns it.');
  await expect(panel(judge, 'The one limit is broken')).toContainText('As they were when it was decided.');
  const places = judge.getByRole('navigation', { name: 'Places' });
  await expect(places.getByRole('link', { name: 'Reviews', exact: true })).toBeVisible();

  // The viewer exports it.
  const look = viewer.page;
  await look.goto(home);
  await expect(look.getByText('Vetted').first()).toBeVisible();
  await expect(look.getByRole('button', { name: 'Withdraw' })).toHaveCount(0);
  await look.getByRole('button', { name: 'Show the files' }).click();
  const [download] = await Promise.all([
    look.waitForEvent('download'),
    look.getByRole('link', { name: 'Download fog_signal.h' }).click(),
  ]);
  expect(await textOf(download)).toContain('fog_signal');

  // The admin withdraws it; it stays, flagged.
  await admin.page.goto(home);
  await pressByKey(admin.page, 'Withdraw');
  const leaving = admin.page.getByRole('dialog', { name: 'Withdraw revision 3' });
  await leaving.getByRole('button', { name: 'Withdraw' }).click();
  await expect(leaving.getByText('1 to 2000 characters')).toBeVisible();
  await leaving.getByRole('textbox').fill('The ladder of the second board glitches on it.');
  await leaving.getByRole('button', { name: 'Withdraw' }).click();
  await expect(admin.page.getByText('Revision 3 is withdrawn.')).toBeVisible();
  await look.reload();
  await expect(look.getByText('Withdrawn: do not build it in.')).toBeVisible();
  await expect(look.getByText('The ladder of the second board glitches on it.')).toBeVisible();
  await expect(figure(look, 'Codes used')).toContainText('of 512');
  await mailTo(author.context.request, author.person.email, 'Withdrawn: revision 3');
  await close();
});

test('of two who decide in the same second one is told, and keeps what was typed', async ({
  browser,
  quiet,
}) => {
  test.setTimeout(120_000);
  const { team, reviewer, second, author, close } = await makeCrew(browser, quiet, {
    author: 'author',
    reviewer: 'reviewer',
    second: 'reviewer',
  });
  const { slug } = await saveTable(author.context.request, team, 'Bell at the mole');
  await submit(author.context.request, team, slug);

  let release = () => {};
  const released = new Promise<void>((resolve) => (release = resolve));
  const waiting: string[] = [];
  const choices = [
    { mate: reviewer, choice: 'Vet it', note: 'Clean enough.' },
    { mate: second, choice: 'Return it', note: 'Too loud at the third.' },
  ];
  for (const { mate, choice, note } of choices) {
    await mate.page.goto(`/teams/${team}/tables/${slug}/revisions/1/review`);
    await mate.page.route('**/verdict', async (route) => {
      waiting.push(choice);
      await released;
      await route.continue();
    });
    await mate.page.getByRole('radio', { name: choice }).check();
    await mate.page.getByRole('textbox', { name: 'Reasons' }).fill(note);
    await mate.page.getByRole('button', { name: choice }).click();
  }
  await expect.poll(() => waiting.length).toBe(2);
  release();

  const beaten = (page: Page) => page.getByText('while you were judging');
  await expect
    .poll(async () => (await beaten(reviewer.page).count()) + (await beaten(second.page).count()))
    .toBe(1);
  const isFirstBeaten = (await beaten(reviewer.page).count()) === 1;
  const [winner, loser] = isFirstBeaten ? [choices[1], choices[0]] : [choices[0], choices[1]];
  const { page } = loser.mate;
  const done = winner.choice === 'Vet it' ? 'vetted' : 'returned';
  await expect(page.getByRole('alert').filter({ hasText: 'while you were judging' })).toContainText(
    `${winner.mate.person.name} has ${done} it`,
  );
  await expect(panel(page, done === 'vetted' ? 'Vetted' : 'Returned')).toContainText(winner.note);
  await expect(page.getByRole('textbox', { name: 'Reasons' })).toHaveValue(loser.note);
  await page.getByRole('button', { name: 'Add it as a comment' }).click();
  await expect(page.getByRole('list', { name: 'Comments on the revision' })).toContainText(loser.note);
  await expect(page.getByRole('textbox', { name: 'Reasons' })).toHaveCount(0);
  await winner.mate.page.reload();
  await expect(winner.mate.page.getByText(loser.note)).toBeVisible();
  await close();
});

test('nobody judges what is their own while the two-person rule is on', async ({ browser, quiet }) => {
  const { team, admin, reviewer, close } = await makeCrew(browser, quiet, { reviewer: 'reviewer' });
  const { page } = reviewer;
  const { slug } = await saveTable(reviewer.context.request, team, 'My own');
  await submit(reviewer.context.request, team, slug);
  await page.goto('/reviews');
  await expect(page).toHaveURL(`/teams/${team}/reviews`);
  await expect(page.getByText('Nothing waits for you')).toBeVisible();
  await page.getByRole('tab', { name: 'Mine' }).click();
  await expect(page).toHaveURL(/show=mine/);
  await page.getByRole('link', { name: 'My own, revision 1' }).click();
  const why = 'The two-person rule: somebody else must judge what you made.';
  await expect(page.getByText(why)).toBeVisible();
  await expect(page.getByRole('heading', { name: 'with no vetted one before it' })).toBeVisible();
  await expect(
    table(page, 'Settings of revision 1').getByRole('row', { name: /^Table length/ }),
  ).toContainText('64 entries');

  await admin.page.goto(`/teams/${team}`);
  await admin.page.getByRole('switch', { name: 'Somebody else must judge' }).focus();
  await admin.page.keyboard.press('Space');
  await expect(admin.page.getByText('The two-person rule is off.')).toBeVisible();
  await page.reload();
  await expect(page.getByText(why)).toBeHidden();
  await page.getByRole('radio', { name: 'Vet it' }).check();
  await page.getByRole('button', { name: 'Vet it' }).click();
  await expect(panel(page, 'Vetted')).toContainText('No reasons were given.');
  await close();
});

test('any two revisions are compared, and heard at one loudness without a gap', async ({
  browser,
  quiet,
}) => {
  const { team, author, close } = await makeCrew(browser, quiet, { author: 'author' });
  const { page } = author;
  const { request } = author.context;
  const lamp = await saveTable(request, team, 'Stepping', { bits: 8 });
  await saveRevision(request, team, lamp, { name: 'Stepping', bits: 8, length: 64, note: 'The same.' });
  await saveTable(request, team, 'Other one', { bits: 8, length: 128 });

  await page.goto(`/teams/${team}/tables/${lamp.slug}`);
  await page.getByRole('link', { name: 'Compare revision 1 with revision 2' }).click();
  await expect(page).toHaveURL(`/teams/${team}/compare?a=stepping:1&b=stepping:2`);
  await expect(page.getByRole('heading', { name: 'No setting differs' })).toBeVisible();
  await expect(page.getByRole('heading', { name: 'No code differs' })).toBeVisible();
  await expect(page.getByRole('heading', { name: 'Figures: 0 better, 0 worse' })).toBeVisible();

  const second = panel(page, 'Second');
  await second.getByRole('searchbox', { name: 'Find a table' }).fill('oth');
  await second.getByRole('combobox', { name: 'Table' }).selectOption({ label: 'Other one' });
  await expect(page).toHaveURL(/a=stepping.*b=other-one/);
  await expect(page.getByRole('heading', { name: 'The tables have different lengths' })).toBeVisible();
  await page.getByRole('button', { name: 'Swap' }).click();
  await expect(page).toHaveURL(/a=other-one.*b=stepping/);
  await expect(page.getByRole('row', { name: /^Table length/ })).toContainText('128 entries64 entries');
  const cycles = page.getByRole('slider', { name: 'Both cycles: reading' });
  await cycles.focus();
  await page.keyboard.press('ArrowRight');
  await expect(page.getByRole('figure', { name: 'Both cycles' })).toContainText('Stepping, revision 1');

  await page.getByRole('button', { name: 'Play' }).click();
  await expect(page.getByText('Playing Stepping, revision 1 as a loop.')).toBeVisible();
  await page.getByRole('radio', { name: 'Other one, revision 1' }).check();
  await expect(page.getByText('Playing Other one, revision 1 as a loop.')).toBeVisible();
  await page.getByRole('button', { name: 'Stop' }).click();
  await expect(page.getByText('Brought to equal RMS.')).toBeVisible();
  await close();
});

test('limits changed by two admins at once: the second sees what stands there, and keeps what was typed', async ({
  page,
}) => {
  const { team } = await beginWithTeam(page);
  const made = await post(page.request, `/teams/${team}/limit-sets`, { tag: null, limits: { minSnrDb: 40 } });
  const { id } = (await made.json()) as { id: number };
  await page.goto(`/teams/${team}`);
  await page.getByRole('button', { name: 'Change the limits of all tables' }).click();
  const sheet = page.getByRole('dialog', { name: 'Limits for all tables' });
  await expect(sheet.getByRole('textbox', { name: 'SNR at least' })).toHaveValue('40');
  await sheet.getByRole('textbox', { name: 'SNR at least' }).fill('50');
  const origin = process.env.STEPWELL_TEST_ADDRESS ?? '';
  const theirs = await page.request.put(`${origin}/api/v1/teams/${team}/limit-sets/${id}`, {
    headers: { Origin: origin, 'If-Match': made.headers().etag },
    data: { limits: { minSnrDb: 45, maxClipped: 0 } },
  });
  expect(theirs.status()).toBe(200);
  await sheet.getByRole('button', { name: 'Set these' }).click();
  const other = sheet.getByRole('region', { name: 'Set by somebody else' });
  await expect(other).toContainText('SNR at least 45 dB');
  await expect(other).toContainText('Clipped at most 0 entries');
  await expect(sheet.getByRole('textbox', { name: 'SNR at least' })).toHaveValue('50');
  await sheet.getByRole('button', { name: 'Set mine' }).click();
  await expect(panel(page, 'Limits for vetting')).toContainText('SNR at least 50 dB');
  await expect(panel(page, 'Limits for vetting')).not.toContainText('Clipped');
  await page.getByRole('button', { name: 'Remove the limits of all tables' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Remove', exact: true }).click();
  await expect(panel(page, 'Limits for vetting')).toContainText('None are set, so anything can be vetted.');
});
