/**
 * Who may see and do what, asked of the running product without its screens: each action, route and page is tried as a
 * stranger, as a member of another workspace and in each role. What is refused changes nothing in the database.
 */
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser } from '@playwright/test';
import { roleReaches, roles } from '../../lib/roles';
import { actionCases } from './access/action-cases';
import { pageCases, routeCases } from './access/address-cases';
import { type Caller, call, type Ground, newScene, type Scene } from './access/scene';
import { codeOf, postAction, routeOfFile, serverActions } from './access/server-calls';
import { openStored } from './access/stored';
import { demoPeople, demoWorkspace, expect, freshWorkspace, sessionOf, test } from './support';

// Nothing of this is seen on a screen, and eight browsers would be recorded for each case.
test.use({ trace: 'off', screenshot: 'off' });

const caller = {} as Record<'stranger' | 'outsider' | 'guest' | (typeof roles)[number], Caller>;
const actions = serverActions();
const stored = openStored();
let ground: Ground;
/** The outsider's own workspace. */
let elsewhere: string;

async function newPerson(browser: Browser, name: string) {
  const context = await browser.newContext();
  const { email, slug } = await freshWorkspace(await context.newPage(), name);
  return { caller: { request: context.request, email }, slug };
}

test.beforeAll(async ({ browser, baseURL }) => {
  for (const role of roles) {
    const context = await browser.newContext({ storageState: await sessionOf(browser, role) });
    caller[role] = { request: context.request, email: demoPeople[role] };
  }
  const outsider = await newPerson(browser, 'Outsider');
  const guest = await newPerson(browser, 'Guest');
  elsewhere = outsider.slug;
  caller.outsider = outsider.caller;
  caller.guest = guest.caller;
  caller.stranger = { request: (await browser.newContext()).request, email: '' };
  ground = {
    origin: baseURL ?? '',
    workspace: demoWorkspace,
    owner: caller.owner,
    outsider: caller.outsider,
    guest: caller.guest,
    actions,
    stored,
  };
});

test.afterAll(() => stored.close());

/** Every file of that name below app/, as the route that it serves. */
const routesOf = (fileName: 'page.tsx' | 'route.ts') =>
  readdirSync('app', { recursive: true, encoding: 'utf8' })
    .filter((path) => path.endsWith(`/${fileName}`) || path === fileName)
    .map((path) => routeOfFile(join('app', path)));

test('the tables name every action, route and page of the product', () => {
  expect(actionCases.map(({ name }) => name).sort()).toEqual(actions.map(({ name }) => name).sort());
  expect(routeCases.map(({ route }) => route).sort()).toEqual(routesOf('route.ts').sort());
  expect(pageCases.map(({ route }) => route).sort()).toEqual(routesOf('page.tsx').sort());
});

for (const { name, need, input, namesThings, answer = 'ok', permitted } of actionCases) {
  test(`${name} asks for ${need === 'nobody' ? 'nothing' : need}`, async () => {
    const own = await input(newScene(ground));
    const inDemo = { workspace: demoWorkspace, ...own };
    const codeFor = async (who: Caller, given: object) => codeOf(await call(ground, who, name, given));

    if (need === 'nobody') {
      expect(await codeFor(caller.stranger, own)).toBe(answer);
      return;
    }
    const before = await stored.fingerprint();
    expect(await codeFor(caller.stranger, inDemo), 'a stranger').toBe('not_signed_in');
    if (need === 'anybody') {
      expect(await stored.fingerprint()).toEqual(before);
      expect(await codeFor(caller.outsider, own), 'somebody signed in').toBe(answer);
      return;
    }
    expect(await codeFor(caller.outsider, inDemo), 'a member of another workspace').toBe('not_found');
    if (namesThings) {
      const there = { workspace: elsewhere, ...own };
      expect(await codeFor(caller.outsider, there), 'its ids under another workspace').toBe('not_found');
    }
    const [lesser, permittedRoles] = [
      roles.filter((role) => !roleReaches(role, need)),
      roles.filter((role) => roleReaches(role, need)),
    ];
    for (const role of lesser) expect(await codeFor(caller[role], inDemo), role).toBe('forbidden');
    expect(await stored.fingerprint(), 'what was refused changed something').toEqual(before);
    for (const who of permitted ? [permitted] : permittedRoles) {
      expect(await codeFor(caller[who], inDemo), who).toBe(answer);
    }
  });
}

test('an action that another site asks for is not carried out', async () => {
  const action = actions.find(({ name }) => name === 'createKernelAction');
  const input = actionCases.find(({ name }) => name === 'createKernelAction')?.input(newScene(ground));
  if (!action || !input) throw new Error('No such action');
  const before = await stored.fingerprint();
  const posted = {
    action,
    path: `/w/${demoWorkspace}/kernels`,
    input: { workspace: demoWorkspace, ...input },
  };
  const answer = await postAction(caller.owner.request, posted, 'https://elsewhere.example');
  expect(answer.status()).toBe(500);
  expect(await stored.fingerprint()).toEqual(before);
});

/** The address of a case in a workspace, with the ids that it names. */
const addressIn = async (scene: Scene, route: string, workspace: string, proved = false) => {
  const ids: Record<string, () => Promise<string>> = {
    kernel: scene.kernelId,
    fabric: scene.fabricId,
    draft: scene.draftId,
    mapping: proved ? scene.provedMappingId : scene.mappingId,
    solve: scene.solveId,
  };
  let address = route.replace('[workspace]', workspace);
  for (const [name, id] of Object.entries(ids)) {
    if (address.includes(`[${name}]`)) address = address.replace(`[${name}]`, await id());
  }
  return address.replace('[number]', '1').replace('[token]', 'A'.repeat(43));
};

async function statusFor(who: Caller, address: string) {
  const answer = await who.request.get(address, { maxRedirects: 0 });
  return { status: answer.status(), to: answer.headers().location ?? null };
}

for (const { route, query = '', open, proved } of routeCases) {
  test(`GET ${route}`, async () => {
    const scene = newScene(ground);
    const address = `${await addressIn(scene, route, demoWorkspace, proved)}${query}`;
    if (route.includes('[kernel]'))
      await call(ground, caller.owner, 'keepKernelVersionAction', {
        workspace: demoWorkspace,
        kernelId: await scene.kernelId(),
        revision: 1,
        label: '',
      });
    const status = async (who: Caller, at = address) => (await statusFor(who, at)).status;
    expect(await status(caller.stranger)).toBe(open ? 200 : 401);
    expect(await status(caller.outsider)).toBe(open ? 200 : 404);
    if (!open) {
      const there = `${await addressIn(scene, route, elsewhere, proved)}${query}`;
      expect(await status(caller.outsider, there), 'its ids under another workspace').toBe(404);
    }
    for (const role of roles) expect(await status(caller[role]), role).toBe(200);
  });
}

for (const { route, need, leadsTo } of pageCases) {
  test(`page ${route}`, async () => {
    const scene = newScene(ground);
    const address = await addressIn(scene, route, demoWorkspace);
    if (route.includes('[number]'))
      await call(ground, caller.owner, 'keepKernelVersionAction', {
        workspace: demoWorkspace,
        kernelId: await scene.kernelId(),
        revision: 1,
        label: '',
      });
    const shown = { status: leadsTo ? 307 : 200 };
    if (need === 'nobody') {
      expect(await statusFor(caller.stranger, address)).toMatchObject(shown);
      return;
    }
    const stranger = await statusFor(caller.stranger, address);
    expect(stranger.status, 'a stranger').toBe(307);
    expect(stranger.to).toMatch(/^\/sign-in/);
    if (need === 'anybody') {
      expect(await statusFor(caller.outsider, address)).toMatchObject(shown);
      return;
    }
    expect(await statusFor(caller.outsider, address), 'a member of another workspace').toMatchObject({
      status: 404,
    });
    if (/\[(kernel|fabric|draft|mapping)\]/.test(route)) {
      const there = await addressIn(scene, route, elsewhere);
      expect(await statusFor(caller.outsider, there), 'its ids under another workspace').toMatchObject({
        status: 404,
      });
    }
    for (const role of roles) {
      const expected = roleReaches(role, need) ? shown : { status: 404 };
      expect(await statusFor(caller[role], address), role).toMatchObject(expected);
    }
  });
}

test('an address that can name nothing is not found', async () => {
  for (const address of [
    '/w/%00/kernels',
    '/w/nowhere/kernels',
    `/w/${demoWorkspace}/kernels/anything`,
    `/w/${demoWorkspace}/kernels/%00`,
    `/w/${demoWorkspace}/mappings/bench/%F0%9F%A7%B5`,
    '/api/w/%00/kernels/anything/versions',
    `/api/w/${demoWorkspace}/kernels/anything/export?format=json`,
    `/api/w/${demoWorkspace}/nothing`,
  ]) {
    expect(await statusFor(caller.owner, address), address).toMatchObject({ status: 404 });
  }
});
