import { mkdirSync } from 'node:fs';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { makeStudio } from '../support/factories/studio.ts';
import { tokenIn } from '../support/mail-links.ts';
import { type Site, SCREENS, startSite, type Visitor } from './support.ts';

const PASSWORD = 'copper gutters drip at noon';
/** Milliseconds that a walk over many pages may take on a machine that is busy with other things. */
const A_JOURNEY = 300_000;
let site: Site;
beforeAll(async () => void (site = await startSite()));
afterAll(() => site.stop());
beforeEach(() => site.house.mails.clear());

/** Where somebody wants to look at the pages: a folder for pictures, outside the tree. */
const pictures = process.env.ORIEL_TEST_PICTURES;
if (pictures) mkdirSync(pictures, { recursive: true });
async function look(visitor: Visitor, name: string): Promise<void> {
  await visitor.audit();
  if (!pictures) return;
  for (const [screen, { viewport }] of Object.entries(SCREENS)) {
    await visitor.page.setViewportSize(viewport);
    await visitor.page.screenshot({ path: `${pictures}/${name}-${screen}.png`, fullPage: true });
  }
  await visitor.page.setViewportSize(SCREENS.desktop.viewport);
}

const press = (visitor: Visitor, name: string | RegExp) => visitor.page.getByRole('button', { name }).click();
const fill = (visitor: Visitor, label: string, value: string) => visitor.page.getByLabel(label, { exact: true }).fill(value);

it(
  'goes from signing up to confirming, inviting, joining and removing',
  async () => {
    const owner = await site.visit('/settings/team');
    owner.expectErrors(/status of (401|422)/);
    await owner.page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await look(owner, 'sign-in');
    await owner.page.getByRole('link', { name: 'Sign up' }).click();
    await press(owner, 'Create the studio');
    await owner.page.getByText('This is no e-mail address.').waitFor();
    await look(owner, 'sign-up-errors');
    await fill(owner, 'Name of the studio', 'Lantern Wharf');
    await fill(owner, 'Your name', 'Edda Marlow');
    await fill(owner, 'E-mail address', 'Edda@Lantern-Wharf.test');
    await fill(owner, 'Password', 'lantern wharf 1');
    await press(owner, 'Create the studio');
    await owner.page.getByText('This is mostly your own address or name').waitFor();
    await fill(owner, 'Password', PASSWORD);
    await press(owner, 'Create the studio');
    await owner.page.getByRole('heading', { name: 'Look into your mail' }).waitFor();
    await look(owner, 'mail-sent');
    await site.house.runJobs();

    const token = tokenIn(site.house, 'edda@lantern-wharf.test', 'confirm-email');
    await owner.page.goto(`${site.house.address}/confirm-email/${token}`);
    await fill(owner, 'The password you chose', 'not that one at all');
    await press(owner, /^Confirm/);
    await owner.page.getByText('This is not the password that was chosen').waitFor();
    await look(owner, 'confirm-email');
    await fill(owner, 'The password you chose', PASSWORD);
    await press(owner, /^Confirm/);
    await owner.page.waitForURL('**/desk');

    await owner.page.goto(`${site.house.address}/settings`);
    await owner.page.getByRole('navigation', { name: 'Settings' }).getByRole('link', { name: 'Team' }).click();
    await owner.page.getByText('Nobody is invited').waitFor();
    await look(owner, 'team-empty');
    await press(owner, 'Invite an assistant');
    await fill(owner, 'Name', 'Joseph Quill');
    await fill(owner, 'E-mail address', 'joseph@lantern-wharf.test');
    await look(owner, 'team-invite');
    await press(owner, 'Send the invitation');
    await owner.page.getByText('The invitation is on its way to Joseph Quill.').waitFor();
    await look(owner, 'team-invited');
    await site.house.runJobs();

    const assistant = await site.visit(`/join/${tokenIn(site.house, 'joseph@lantern-wharf.test', 'join')}`);
    assistant.expectErrors(/status of (401|422)/);
    await assistant.page.getByRole('heading', { name: 'Join Lantern Wharf' }).waitFor();
    await look(assistant, 'join');
    await fill(assistant, 'Password', 'seven bridges, one of them blue');
    await press(assistant, 'Join Lantern Wharf');
    await assistant.page.waitForURL('**/desk');
    await assistant.page.goto(`${site.house.address}/settings`);
    await assistant.page.getByText('Only the owner of the studio changes these.').waitFor();
    expect(await assistant.page.getByRole('link', { name: 'Team' }).count()).toBe(0);
    await look(assistant, 'settings-of-assistant');

    await owner.page.reload();
    await press(owner, 'Remove Joseph Quill');
    await owner.page.getByRole('dialog').getByRole('button', { name: 'Remove Joseph Quill' }).click();
    await owner.page.getByRole('region', { name: 'People of the studio' }).getByText('Joseph Quill').waitFor({ state: 'detached' });
    await assistant.page.goto(`${site.house.address}/settings/storage`);
    await assistant.page.getByRole('heading', { name: 'Sign in' }).waitFor();
    expect(new URL(assistant.page.url()).searchParams.get('next')).toBe('/settings/storage');

    await press(owner, 'Sign out');
    await owner.page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await fill(owner, 'E-mail address', 'edda@lantern-wharf.test');
    await fill(owner, 'Password', 'wrong, wrong, wrong');
    await press(owner, 'Sign in');
    await owner.page.getByText('do not belong together').waitFor();
    await look(owner, 'sign-in-refused');
    await fill(owner, 'Password', PASSWORD);
    await press(owner, 'Sign in');
    await owner.page.waitForURL('**/desk');
    await assistant.close();
    await owner.close();
  },
  A_JOURNEY,
);

it(
  'replaces a forgotten password',
  async () => {
    await site.house.request
      .post('/api/sign-up')
      .send({ studioName: 'Weir Street', name: 'Ada Holm', email: 'ada@weir.test', password: PASSWORD });
    const visitor = await site.visit('/sign-in', SCREENS.phone);
    visitor.expectErrors(/status of (401|410)/);
    await visitor.page.getByRole('link', { name: 'Forgotten your password?' }).click();
    await look(visitor, 'reset-ask');
    await fill(visitor, 'E-mail address', 'ada@weir.test');
    await press(visitor, 'Send me a link');
    await visitor.page.getByRole('heading', { name: 'Look into your mail' }).waitFor();
    await site.house.runJobs();
    const address = `${site.house.address}/reset-password/${tokenIn(site.house, 'ada@weir.test', 'reset-password')}`;
    await visitor.page.goto(address);
    await visitor.page.getByRole('heading', { name: 'Choose a new password' }).waitFor();
    await look(visitor, 'reset-choose');
    await fill(visitor, 'New password', 'slate roofs after the rain');
    await press(visitor, 'Show the new password');
    expect(await visitor.page.getByLabel('New password', { exact: true }).getAttribute('type')).toBe('text');
    await press(visitor, 'Set the new password');
    await visitor.page.getByText('The new password counts from now on.').waitFor();
    await look(visitor, 'reset-done');
    await visitor.page.goto(address);
    await visitor.page.getByRole('heading', { name: 'This link does not work' }).waitFor();
    await look(visitor, 'link-used');
    await visitor.close();
  },
  A_JOURNEY,
);

it(
  'keeps the page, and what was typed, when the session ends meanwhile',
  async () => {
    const made = await makeStudio(site.house);
    const visitor = await site.visit('/settings/studio', { cookie: made.owner.cookie });
    visitor.expectErrors(/status of 401/);
    await fill(visitor, 'Name', 'Typed before the session ended');
    await site.house.sessions.closeAll(made.owner.account.id);
    await press(visitor, 'Save');
    await visitor.page.getByText('Your session has ended.').waitFor();
    expect(await visitor.page.getByLabel('Name', { exact: true }).inputValue()).toBe('Typed before the session ended');
    await visitor.audit();
    await visitor.close();
  },
  A_JOURNEY,
);
