import AxeBuilder from '@axe-core/playwright';
import { readFileSync } from 'node:fs';
import { expect, test, type Page } from '@playwright/test';

const PASSWORD = 'saltmarsh-demo-1264';

/** Every console error fails the test it happened in. */
const watch = (page: Page): string[] => {
  const errors: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(message.text());
  });
  page.on('pageerror', (error) => errors.push(error.message));
  return errors;
};

async function signIn(page: Page, role: string): Promise<string> {
  const answer = await page.request.post('/api/auth/sign-in/email', {
    data: { email: `${role}@saltmarsh.example`, password: PASSWORD },
  });
  expect(answer.status()).toBe(200);
  const me = (await (await page.request.get('/api/v1/me')).json()) as { workspaces: { id: string }[] };
  const workspace = me.workspaces[0]!.id;
  const communities = (await (
    await page.request.get(`/api/v1/workspaces/${workspace}/communities`)
  ).json()) as { items: { id: string }[] };
  return `/w/${workspace}/c/${communities.items[0]!.id}`;
}

async function expectAccessible(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(
    violations.map((one) => `${one.id}: ${one.nodes.map((node) => node.target.join(' ')).join(', ')}`),
  ).toEqual([]);
}

test('a new user signs up, reads the mail, makes a workspace and sees the published two-faction split', async ({
  page,
}) => {
  const errors = watch(page);
  const email = `new-${Date.now()}@person.example`;
  await page.goto('/sign-up', { waitUntil: 'networkidle' });
  await page.getByLabel('Your name').fill('Nora New');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill('a-long-enough-word');
  await page.getByRole('button', { name: 'Make an account' }).click();
  await expect(page).toHaveURL(/check-mail/);
  const letter = page.getByRole('article').filter({ hasText: email });
  await expect(async () => {
    await page.goto('/mail');
    await expect(letter).toBeVisible({ timeout: 1000 });
  }).toPass();
  await letter.getByRole('link').first().click();
  await expect(page).toHaveURL(/\/w\/new/);
  await page.getByLabel('Name of the workspace').fill('Karate');
  await page.getByRole('button', { name: 'Make the workspace' }).click();
  await page.getByLabel('Name of the community').fill('The club');
  await page.getByRole('button', { name: 'Make the community' }).click();
  await expect(page).toHaveURL(/imports\/new/);
  // The drop zone listens once its island has woken.
  await page.waitForLoadState('networkidle');
  const file = (name: string, as: string) => ({
    name: as,
    mimeType: 'text/csv',
    buffer: readFileSync(`tests/reference/data/karate/${name}`),
  });
  await page
    .getByLabel('Files to load')
    .setInputFiles([file('edges.csv', 'ties.csv'), file('members.csv', 'members.csv')]);
  await expect(page.getByRole('heading', { name: 'members.csv' })).toBeVisible();
  await page.getByRole('button', { name: 'Check all rows' }).click();
  await page.getByRole('button', { name: 'Load this snapshot' }).click();
  await expect(page).toHaveURL(/\/map/);
  await expect(page.getByText('34 of 34 members shown')).toBeVisible();

  // Zachary 1977, by the sign of the Fiedler vector: 15 and 19 members, conductance 10/66 (tests/reference/data/karate).
  const base = new URL(page.url()).pathname.replace(/\/map$/, '');
  const snapshot = new URL(page.url()).searchParams.get('snapshot') ?? (await newestSnapshot(page, base));
  const made = (await (
    await page.request.post(`/api/v1/snapshots/${snapshot}/groupings`, {
      data: { method: 'fiedler', laplacian: 'combinatorial', cut: 'sign' },
    })
  ).json()) as { job: { id: string } };
  const job = await ended(page, made.job.id);
  const grouping = (await (await page.request.get(job.result.href)).json()) as {
    groups: { size: number; conductance: number }[];
  };
  expect(grouping.groups.map((group) => group.size).sort((a, b) => a - b)).toEqual([15, 19]);
  expect(grouping.groups[0]!.conductance).toBeCloseTo(10 / 66, 10);
  await page.goto(`${base}/groups/${job.result.id}`);
  await expect(page.getByText('19 members').first()).toBeVisible();
  await expect(page.getByText('15 members').first()).toBeVisible();
  expect(errors).toEqual([]);
});

async function newestSnapshot(page: Page, base: string): Promise<string> {
  const community = base.split('/').at(-1)!;
  const list = (await (await page.request.get(`/api/v1/communities/${community}/snapshots`)).json()) as {
    items: { id: string }[];
  };
  return list.items[0]!.id;
}

async function ended(
  page: Page,
  id: string,
): Promise<{ state: string; result: { id: string; href: string } }> {
  for (;;) {
    const job = (await (await page.request.get(`/api/v1/jobs/${id}`)).json()) as {
      state: string;
      result: { id: string; href: string };
    };
    if (!['queued', 'running'].includes(job.state)) return job;
    await page.waitForTimeout(300);
  }
}

test('an analyst explores, filters and shares a view that a viewer opens in the same state, without names', async ({
  page,
  browser,
}) => {
  const errors = watch(page);
  const base = await signIn(page, 'analyst');
  await page.goto(`${base}/map`);
  await expect(page.getByText('1,264 of 1,264 members shown')).toBeVisible();
  await page.getByRole('button', { name: 'Add filter' }).click();
  await page.getByRole('menuitem', { name: 'Ties, 5 or more' }).click();
  // The chip's own button: the menu that is closing still has the same words.
  await expect(page.getByRole('button', { name: 'Remove Ties, 5 or more' })).toBeVisible();
  await expect(page).toHaveURL(/degree/);
  await page.getByRole('button', { name: 'Saved views' }).click();
  await page.getByRole('menuitem', { name: 'Save this view' }).click();
  const name = `Five ties or more ${Date.now()}`;
  await page.getByLabel('Name of view').fill(name);
  await page.getByText('Everyone in the workspace').click();
  await page.getByRole('button', { name: 'Save view' }).click();
  await expect(page.getByText(`Saved “${name}”`)).toBeVisible();
  expect(errors).toEqual([]);

  const viewer = await (await browser.newContext({ baseURL: test.info().project.use.baseURL! })).newPage();
  const viewerErrors = watch(viewer);
  await signIn(viewer, 'viewer');
  await viewer.goto(`${base}/views`);
  await viewer.getByRole('link', { name }).click();
  await expect(viewer.getByRole('button', { name: 'Remove Ties, 5 or more' })).toBeVisible();
  await viewer
    .getByRole('radio', { name: 'List' })
    .or(viewer.getByRole('button', { name: 'List' }))
    .first()
    .click();
  await expect(viewer.getByText(/^m-[0-9a-f]{8}$/).first()).toBeVisible();
  expect((await viewer.request.get(`${base}/map`)).status()).toBe(403);
  expect(viewerErrors).toEqual([]);
});

test('an analyst shares a view with a role and takes it back', async ({ page }) => {
  const errors = watch(page);
  const base = await signIn(page, 'analyst');
  await page.goto(`${base}/views`, { waitUntil: 'networkidle' });
  const row = page.getByRole('row', { name: /Autumn grouping/ });
  await row.getByRole('button', { name: 'More' }).click();
  await page.getByRole('menuitem', { name: 'Share' }).click();
  const dialog = page.getByRole('dialog', { name: 'Share “Autumn grouping, all members”' });
  await expect(dialog).toBeVisible();
  await dialog.getByRole('button', { name: /People and roles/ }).click();
  await page.getByRole('option', { name: 'Moderators' }).click();
  await dialog.getByRole('button', { name: 'Share', exact: true }).click();
  await expect(dialog.getByRole('list', { name: 'Shared with' })).toContainText('Moderators can open');
  await expectAccessible(page);
  await dialog.getByRole('button', { name: 'Stop sharing with Moderators' }).click();
  await expect(dialog.getByRole('list', { name: 'Shared with' })).toBeHidden();
  await dialog.getByRole('button', { name: 'Done' }).click();
  await expect(dialog).toBeHidden();
  expect(errors).toEqual([]);
});

test('a moderator reads the evidence of a case and decides it with a reason', async ({ page }) => {
  const errors = watch(page);
  const base = await signIn(page, 'moderator');
  await page.goto(`${base}/cases`);
  await expect(page.getByText('A departure is a reason to look, not a finding.')).toBeVisible();
  await page.getByRole('button', { name: 'Record decision' }).click();
  await expect(page.getByText('Say in a sentence what you looked at and why.')).toBeVisible();
  await page.getByText('Reach out', { exact: true }).click();
  await page.getByLabel('Reason').fill('Fall follows one trade; ask how the swap went first.');
  await page.getByRole('button', { name: 'Record decision' }).click();
  await expect(page.getByText('Case recorded: Reach out')).toBeVisible();
  await expect(page.getByText('decided reach out').first()).toBeVisible();
  expect(errors).toEqual([]);
});

for (const place of [
  'brief',
  'map',
  'members',
  'groups',
  'readings',
  'cases',
  'views',
  'imports',
  'imports/new',
])
  test(`axe finds nothing on ${place}, in either theme`, async ({ page, context, baseURL }) => {
    const errors = watch(page);
    const base = await signIn(page, 'analyst');
    for (const theme of ['linen', 'evening']) {
      await context.addCookies([{ name: 'theme', value: theme, url: baseURL! }]);
      await page.goto(`${base}/${place}`, { waitUntil: 'networkidle' });
      await expectAccessible(page);
    }
    expect(errors).toEqual([]);
  });

for (const path of ['/sign-in', '/sign-up', '/forgot'])
  test(`axe finds nothing on ${path}`, async ({ page }) => {
    const errors = watch(page);
    await page.goto(path, { waitUntil: 'networkidle' });
    await expectAccessible(page);
    expect(errors).toEqual([]);
  });

test('pages of a workspace are closed to strangers, to other workspaces and to roles that may not open them', async ({
  page,
  browser,
  baseURL,
}) => {
  const base = await signIn(page, 'analyst');
  const settings = `${base.split('/c/')[0]}/settings/people`;
  const open = async (
    role: string | null,
    path: string,
  ): Promise<{ status: number; url: string; text: string }> => {
    const context = await browser.newContext({ baseURL: baseURL! });
    const other = await context.newPage();
    if (role)
      await other.request.post('/api/auth/sign-in/email', {
        data: { email: `${role}@saltmarsh.example`, password: PASSWORD },
      });
    const response = await other.goto(path);
    const answer = { status: response!.status(), url: other.url(), text: await response!.text() };
    await context.close();
    return answer;
  };
  for (const place of ['map', 'members', 'groups', 'readings', 'cases', 'imports', 'imports/new']) {
    const viewer = await open('viewer', `${base}/${place}`);
    expect([place, viewer.status]).toEqual([place, 403]);
    expect(viewer.text).not.toContain('Saltmarsh Growers');
    expect((await open(null, `${base}/${place}`)).url).toContain('/sign-in?next=');
  }
  expect((await open('analyst', settings)).status).toBe(403);
  const nowhere = base.replace(/[0-9a-f]{12}/, '000000000000');
  expect((await open('owner', `${nowhere}/map`)).status).toBe(404);
});
