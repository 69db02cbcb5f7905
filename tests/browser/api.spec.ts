import { expect, request, test, type APIRequestContext } from '@playwright/test';

const PASSWORD = process.env.DEMO_PASSWORD ?? 'brackwater-demo';

async function signedIn(email: string): Promise<APIRequestContext> {
  const context = await request.newContext({ baseURL: process.env.BASE_URL });
  const answer = await context.post('/api/v1/session', { data: { email, password: PASSWORD } });
  expect(answer.status()).toBe(200);
  return context;
}

const person = (role: string) => signedIn(`${role}@brackwater.example`);
const stranger = () => signedIn('engineer@northgate.example');

async function first<T>(api: APIRequestContext, path: string, pick: (item: T) => boolean): Promise<T> {
  const { items } = (await (await api.get(path)).json()) as { items: T[] };
  const found = items.find(pick);
  if (!found) throw new Error(`nothing that fits at ${path}`);
  return found;
}

interface Listed {
  id: string;
  tag: string;
  state: string;
}

const axisOf = (api: APIRequestContext, tag: string) =>
  first<Listed>(api, '/api/v1/axes', (axis) => axis.tag === tag);
const changeIn = (api: APIRequestContext, state: string) =>
  first<Listed>(api, '/api/v1/changes', (change) => change.state === state);

test('nobody gets anything without signing in', async ({ playwright }) => {
  const api = await playwright.request.newContext({ baseURL: process.env.BASE_URL });
  for (const path of ['/axes', '/machines', '/changes', '/rules', '/session']) {
    const answer = await api.get(`/api/v1${path}`);
    expect(answer.status()).toBe(401);
    expect(answer.headers()['content-type']).toContain('application/problem+json');
  }
  expect((await api.post('/api/v1/check', { data: {} })).status()).toBe(401);
});

test('the session cookie can’t be read by a script nor be sent from another site’s form', async ({
  playwright,
}) => {
  const api = await playwright.request.newContext({ baseURL: process.env.BASE_URL });
  const data = { email: 'engineer@brackwater.example', password: PASSWORD };
  const cookie = (await api.post('/api/v1/session', { data })).headers()['set-cookie'];
  expect(cookie).toMatch(/;\s*HttpOnly/i);
  expect(cookie).toMatch(/;\s*SameSite=Lax/i);
  const foreign = await api.post('/api/v1/session', {
    data,
    headers: { origin: 'https://elsewhere.example' },
  });
  expect(foreign.status()).toBe(403);
});

test('an organisation’s things are not there for a person of another', async () => {
  const ours = await person('engineer');
  const theirs = await stranger();
  const axis = await axisOf(ours, 'PT-21');
  const change = await changeIn(ours, 'submitted');
  const keep = {
    plant: { num: [1], den: [1, 1] },
    controller: { kp: 1, ti: 1 },
    reason: 'none of their business',
  };
  for (const path of [
    `/axes/${axis.id}`,
    `/axes/${axis.id}/gain-sets`,
    `/changes/${change.id}`,
    `/changes/${change.id}/sheet`,
  ])
    expect((await theirs.get(`/api/v1${path}`)).status()).toBe(404);
  expect((await theirs.post(`/api/v1/axes/${axis.id}/gain-sets`, { data: keep })).status()).toBe(404);
  expect(
    (await theirs.post(`/api/v1/changes/${change.id}/approve`, { data: { password: PASSWORD } })).status(),
  ).toBe(404);
  expect((await theirs.get(`/axes/${axis.id}`)).status()).toBe(404);
  expect((await theirs.get(`/changes/${change.id}`)).status()).toBe(404);
  expect((await theirs.get(`/sheet/${change.id}`)).status()).toBe(404);
});

test('a technician can’t approve, an engineer can’t approve the own change', async () => {
  const engineer = await person('engineer');
  const change = await changeIn(engineer, 'submitted');
  for (const role of ['technician', 'engineer', 'admin']) {
    const answer = await (
      await person(role)
    ).post(`/api/v1/changes/${change.id}/approve`, { data: { password: PASSWORD } });
    expect(answer.status()).toBe(403);
    expect(((await answer.json()) as { detail: string }).detail.length).toBeGreaterThan(10);
  }
  const after = (await (await engineer.get(`/api/v1/changes/${change.id}`)).json()) as Listed;
  expect(after.state).toBe('submitted');
});

test('wrong requests get 4xx problem details and write nothing', async () => {
  const api = await person('engineer');
  const axis = await axisOf(api, 'FC-40');
  const versions = async () => {
    const { items } = (await (await api.get(`/api/v1/axes/${axis.id}/gain-sets`)).json()) as {
      items: unknown[];
    };
    return items.length;
  };
  const before = await versions();
  const keep = `/api/v1/axes/${axis.id}/gain-sets`;
  const plant = { num: [1], den: [1, 1] };
  const wrong: [string, unknown, number][] = [
    ['/api/v1/plants/parse', { text: 's^2/(s+1)' }, 422],
    ['/api/v1/plants/parse', {}, 400],
    ['/api/v1/plants/parse', { text: 5 }, 400],
    ['/api/v1/tune', { plant, rule: 'no-such-rule', type: 'PI' }, 400],
    ['/api/v1/tune', { rule: 'simc', type: 'PI' }, 400],
    ['/api/v1/tune', { plant: { num: [1], den: [1, -1] }, rule: 'zn-reaction', type: 'PI' }, 422],
    ['/api/v1/check', { plant, controller: { kp: '1' } }, 400],
    ['/api/v1/check', { plant, controller: { kp: 1e300 } }, 400],
    ['/api/v1/check', { plant, controller: { kp: 1, ti: 0 } }, 400],
    ['/api/v1/check', { plant: { num: [1, 0, 0], den: [1, 1] }, controller: { kp: 1 } }, 422],
    ['/api/v1/check', { plant: { num: [1], den: [] }, controller: { kp: 1 } }, 400],
    [keep, { plant, controller: { kp: 1 } }, 400],
    [keep, { plant, controller: { kp: 1 }, reason: '' }, 400],
    [keep, { plant: { num: [1], den: [1, -1] }, controller: { kp: 0.5 }, reason: 'unstable' }, 422],
    ['/api/v1/machines', { name: 'no site' }, 400],
    ['/api/v1/changes', { axisId: axis.id, gainSetId: 'x', reason: 'y', safetyFunction: 'no' }, 400],
  ];
  for (const [path, data, status] of wrong) {
    const answer = await api.post(path, { data });
    expect([path, JSON.stringify(data), answer.status()]).toEqual([path, JSON.stringify(data), status]);
    expect(answer.headers()['content-type']).toContain('application/problem+json');
    const problem = (await answer.json()) as { title: string; detail: string; status: number };
    expect(problem.status).toBe(status);
    expect(problem.detail).not.toBe('');
  }
  const notJson = await api.post(keep, { data: 'kp=1', headers: { 'content-type': 'application/json' } });
  expect(notJson.status()).toBe(400);
  const form = await api.post(keep, { form: { kp: 1 } });
  expect(form.status()).toBe(415);
  expect(await versions()).toBe(before);
});

test('a repeated post with the same key is done once', async () => {
  const api = await person('engineer');
  const axis = await axisOf(api, 'WT-12');
  const headers = { 'idempotency-key': `test-${Date.now()}` };
  const data = {
    plant: { text: 'K=0.8 tau=0.2 theta=0.02' },
    controller: { kp: 2, ti: 0.2 },
    reason: 'sent twice',
  };
  const path = `/api/v1/axes/${axis.id}/gain-sets`;
  const once = await api.post(path, { data, headers });
  const twice = await api.post(path, { data, headers });
  expect([once.status(), twice.status()]).toEqual([201, 201]);
  expect(((await twice.json()) as Listed).id).toBe(((await once.json()) as Listed).id);
  const other = await api.post(path, { data: { ...data, reason: 'another' }, headers });
  expect(other.status()).toBe(409);
});

test('a token acts with its one role, and is described by the OpenAPI document', async ({ playwright }) => {
  const api = await person('engineer');
  const made = await api.post('/api/v1/tokens', {
    data: { name: 'line computer', role: 'engineer', days: 1 },
  });
  expect(made.status()).toBe(201);
  const { token } = (await made.json()) as { token: string };
  const bare = await playwright.request.newContext({
    baseURL: process.env.BASE_URL,
    extraHTTPHeaders: { authorization: `Bearer ${token}` },
  });
  expect((await bare.get('/api/v1/axes')).status()).toBe(200);
  expect(
    (await bare.post('/api/v1/tokens', { data: { name: 'x', role: 'engineer', days: 1 } })).status(),
  ).toBe(403);
  const wrongRole = await api.post('/api/v1/tokens', { data: { name: 'x', role: 'admin', days: 1 } });
  expect(wrongRole.status()).toBe(403);
  const document = (await (await bare.get('/api/v1/openapi.json')).json()) as {
    openapi: string;
    paths: object;
  };
  expect(document.openapi).toBe('3.1.0');
  expect(Object.keys(document.paths)).toContain('/axes/{axis}/gain-sets');
});
