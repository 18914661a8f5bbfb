import { afterAll, beforeAll, expect, it } from 'vitest';
import { queueMail } from '../../api/features/mail/queue-mail.ts';
import { writeMail } from '../../api/features/mail/layout.ts';
import { Mail } from '../../api/models/Mail.ts';
import { Studio } from '../../api/models/Studio.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { SCREENS, type Site, startSite, type Visitor } from './support.ts';

/** Milliseconds that a walk over many pages may take on a machine that is busy with other things. */
const A_JOURNEY = 300_000;
let site: Site;
let made: MadeStudio;
beforeAll(async () => {
  site = await startSite();
  made = await makeStudio(site.house);
});
afterAll(() => site.stop());

/** Where somebody wants to look at the pages: a folder for pictures, outside the tree. */
const pictures = process.env.ORIEL_TEST_PICTURES;
async function look({ page, audit }: Visitor, name: string): Promise<void> {
  await audit();
  if (!pictures) return;
  for (const screen of ['tablet', 'desktop'] as const) {
    await page.setViewportSize(SCREENS[screen].viewport);
    await page.screenshot({ path: `${pictures}/${name}-${screen}.png` });
  }
}

const letter = (subject: string) =>
  writeMail({
    subject,
    studioName: made.studio.name,
    replyTo: made.studio.replyTo,
    greeting: 'Good day Oskar Lind,',
    paragraphs: ['The proofs of Ropewalk Library are ready. Choose twelve of them.'],
    quote: { by: 'Ines Okafor', words: 'The dusk ones came out well.' },
    facts: [{ label: 'Choose by', value: '17 November 2026' }],
    action: { words: 'Open the proof sheet', address: `https://proofs.harrow-lane.test/open/${'a'.repeat(43)}` },
    why: 'You get this because Ines Okafor invited you.',
  });

async function queue(subject: string, values: Partial<Mail> = {}): Promise<string> {
  const id = await site.house.ctx.knex.transaction((trx) =>
    queueMail(trx, {
      studioId: made.studio.id,
      kind: 'sheet-invitation',
      to: { address: 'oskar@tarn-brandreth.test', name: 'Oskar Lind' },
      fromName: made.studio.name,
      replyTo: made.studio.replyTo,
      ...letter(subject),
    }),
  );
  await Mail.query().findById(id).patch(values);
  return id;
}

it(
  'shows the outbox, what a mail looks like, and sends again what may have gone out',
  async () => {
    const visitor = await site.visit('/settings/mail', { cookie: made.owner.cookie });
    await visitor.page.getByText('No mails yet').waitFor();
    await queue('Proof sheet 1: Ropewalk Library', { state: 'sent', sentAt: new Date() });
    await queue('Proof sheet 2: Ropewalk Library', { state: 'failed', problem: 'The mail server said: 550 no such mailbox' });
    const unsure = await queue('Reminder: proof sheet 2', { state: 'unsure', problem: 'It may have gone out.' });
    await visitor.page.reload();
    await visitor.page.getByText('2 mails to look at').waitFor();
    await look(visitor, 'mail-outbox');
    await visitor.page.getByLabel('Show').selectOption('unsure');
    await visitor.page.getByRole('button', { name: 'Proof sheet 2: Ropewalk Library' }).waitFor({ state: 'detached' });
    expect(new URL(visitor.page.url()).search).toBe('?state=unsure');
    await visitor.page.getByRole('button', { name: 'Reminder: proof sheet 2' }).click();
    const frame = visitor.page.frameLocator('iframe[title="The mail as it looks"]');
    await frame.getByText('The dusk ones came out well.').waitFor();
    expect(await visitor.page.locator('iframe').getAttribute('sandbox')).toBe('');
    expect(await frame.locator('body').innerHTML()).not.toContain('aaaaaaaa');
    await look(visitor, 'mail-dialog');
    await visitor.page.getByRole('button', { name: 'Plain text' }).click();
    await visitor.page.getByText('> The dusk ones came out well.').waitFor();
    await visitor.page.getByRole('dialog').getByRole('button', { name: 'Send again' }).click();
    await visitor.page.getByRole('dialog').getByRole('button', { name: 'Send again' }).waitFor({ state: 'detached' });
    await site.house.runJobs();
    expect((await Mail.query().findById(unsure))?.state).toBe('sent');
    await visitor.close();
  },
  A_JOURNEY,
);

it(
  'loses no change of the settings that somebody else made meanwhile',
  async () => {
    const visitor = await site.visit('/settings/studio', { cookie: made.owner.cookie });
    visitor.expectErrors(/status of (412|422)/);
    const name = visitor.page.getByLabel('Name', { exact: true });
    await name.fill('Harrow Lane Pictures');
    await visitor.page.getByLabel('Currency').selectOption('CZK');
    await look(visitor, 'settings-studio');
    await visitor.page.getByRole('button', { name: 'Save' }).click();
    await visitor.page.getByText('Saved.').waitFor();
    await Studio.query()
      .findById(made.studio.id)
      .patch({ name: 'Changed at another browser', version: site.house.ctx.knex.raw('version + 1') });
    await name.fill('Typed here');
    await visitor.page.getByRole('button', { name: 'Save' }).click();
    await visitor.page.getByText('Somebody changed this meanwhile').waitFor();
    expect(await name.inputValue()).toBe('Typed here');
    await visitor.page.getByRole('button', { name: /^Load the present state/ }).click();
    await expect.poll(() => name.inputValue(), { timeout: 30_000 }).toBe('Changed at another browser');
    await name.fill('');
    await visitor.page.getByRole('button', { name: 'Save' }).click();
    await visitor.page.getByText('Write a name.').waitFor();
    await visitor.audit();

    await makeFrame(site.house, await makeCommission(made.studio));
    await visitor.page.getByRole('link', { name: 'Storage' }).click();
    await visitor.page.getByText('Frames, as they were uploaded').waitFor();
    await look(visitor, 'settings-storage');
    await visitor.page.getByRole('link', { name: 'Your account' }).click();
    await visitor.page.getByRole('heading', { name: 'Change the password' }).waitFor();
    await look(visitor, 'settings-account');
    await visitor.close();
  },
  A_JOURNEY,
);

it(
  'writes mails that fit 320 px, in light and in dark',
  async () => {
    const visitor = await site.visit('/sign-in', { viewport: { width: 320, height: 800 } });
    const { page } = visitor;
    await page.goto('about:blank');
    await page.setContent(letter('Proof sheet 1: Ropewalk Library').html);
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(320);
      if (pictures) await page.screenshot({ path: `${pictures}/mail-320-${colorScheme}.png`, fullPage: true });
    }
    visitor.expectErrors(/status of 401/);
    await visitor.close();
  },
  A_JOURNEY,
);
