import { filledPath, IdempotencyKeys, send } from '@/components/forms/send';
import { fieldErrorsOf, problemOf, UNREACHABLE, wholeFormIssues, type Problem } from '@/components/forms/problem';

const operation = { method: 'POST' as const, path: '/api/jobs/{id}/samples' };

function answering(
  status: number,
  body: string,
  contentType = 'application/json',
  headers: Record<string, string> = {},
) {
  const calls: { url: string; init: RequestInit }[] = [];
  const doFetch = (async (url: string, init: RequestInit) => {
    calls.push({ url, init });
    return new Response(status === 204 ? null : body, { status, headers: { 'content-type': contentType, ...headers } });
  }) as unknown as typeof fetch;
  return { calls, doFetch };
}

describe('what is sent', () => {
  test('JSON to our own origin, the key, the version, the path filled in', async () => {
    const { calls, doFetch } = answering(201, '{"id":"x"}', 'application/json', { etag: '"4"' });
    const options = { params: { id: 'a/b' }, ifMatch: 3, idempotencyKey: 'k-12345678' };
    const outcome = await send(operation, { serial: 'P2' }, options, doFetch);
    expect(outcome).toEqual({ ok: true, status: 201, reply: { id: 'x' }, version: '"4"' });
    expect(calls[0]!.url).toBe('/api/jobs/a%2Fb/samples');
    expect(calls[0]!.init).toMatchObject({ method: 'POST', credentials: 'same-origin', body: '{"serial":"P2"}' });
    expect(calls[0]!.init.headers).toMatchObject({
      'content-type': 'application/json',
      'idempotency-key': 'k-12345678',
      'if-match': '"3"',
    });
  });
  test('a form goes as it is, without a content type of ours', async () => {
    const { calls, doFetch } = answering(201, '{}');
    const form = new FormData();
    form.set('file', new Blob(['1;2']), 'a.csv');
    await send({ method: 'POST', path: '/api/sweep-files' }, form, {}, doFetch);
    expect(calls[0]!.init.body).toBe(form);
    expect(calls[0]!.init.headers).not.toHaveProperty('content-type');
  });
  test('nothing to send is no body', async () => {
    const { calls, doFetch } = answering(204, '');
    const outcome = await send({ method: 'DELETE', path: '/api/sessions/x' }, undefined, {}, doFetch);
    expect(outcome).toMatchObject({ ok: true, status: 204, reply: null });
    expect(calls[0]!.init.body).toBeUndefined();
  });
  test('a path that lacks a parameter is a fault of ours and throws', () =>
    expect(() => filledPath('/api/jobs/{id}', {})).toThrow('needs id'));
});

describe('what comes back', () => {
  test('RFC 9457 problem with a JSON pointer per field', async () => {
    const sent = {
      type: '/problems/invalid',
      title: 'Some entries need another look',
      status: 400,
      detail: 'Two are missing.',
      errors: [
        { pointer: '/traces/0/unit', message: 'is needed' },
        { pointer: '#/a~1b', message: 'is odd' },
        { pointer: '', message: 'two files at once' },
      ],
    };
    const { doFetch } = answering(400, JSON.stringify(sent), 'application/problem+json');
    const outcome = await send(operation, {}, { params: { id: 'x' } }, doFetch);
    expect(outcome.ok).toBe(false);
    const { problem } = outcome as { problem: Problem };
    expect(problem).toMatchObject({ status: 400, title: sent.title, detail: sent.detail });
    expect(fieldErrorsOf(problem)).toMatchObject({ 'traces/0/unit': 'is needed', 'a/b': 'is odd' });
    expect(wholeFormIssues(problem)).toEqual(['two files at once']);
  });
  test('a refused file says where, what and what was expected', () => {
    const text = JSON.stringify({ title: 'x', detail: 'y', line: 7715, found: '2 columns', expected: '3 columns' });
    expect(problemOf(422, 'application/problem+json', text).refusal).toEqual({
      line: 7715,
      found: '2 columns',
      expected: '3 columns',
    });
  });
  test('an answer that is no problem document still is a sentence with a next step', () => {
    for (const [status, type, text] of [
      [502, 'text/html', '<html>'],
      [500, 'application/json', 'not json'],
      [503, null, ''],
      [413, 'text/plain', ''],
      [418, 'application/problem+json', '[]'],
    ] as const) {
      const problem = problemOf(status, type, text);
      expect(problem.title).toMatch(/\.$/);
      expect(problem.detail).toMatch(/\.$/);
      expect(problem.errors).toEqual([]);
    }
  });
  test('malformed issues are left out, not shown', () => {
    const text = JSON.stringify({ title: 'x', errors: [null, { pointer: 1 }, { pointer: '/a', message: 'b' }] });
    expect(problemOf(400, 'application/problem+json', text).errors).toEqual([{ pointer: '/a', message: 'b' }]);
  });
  test('no answer at all keeps the work and says what to do', async () => {
    const broken = (async () => {
      throw new TypeError('network');
    }) as unknown as typeof fetch;
    expect(await send(operation, {}, { params: { id: 'x' } }, broken)).toEqual({ ok: false, problem: UNREACHABLE });
    expect(UNREACHABLE.detail).toContain('still here');
  });
  test('an answer cut off in the middle is no answer', async () => {
    const { doFetch } = answering(201, '{"id":');
    expect(await send(operation, {}, { params: { id: 'x' } }, doFetch)).toEqual({ ok: false, problem: UNREACHABLE });
  });
});

describe('one key per thing asked for', () => {
  const refused = (status: number) => ({ ok: false as const, problem: { ...UNREACHABLE, status } });
  function keys() {
    let made = 0;
    return new IdempotencyKeys(() => `key-${(made += 1)}`);
  }
  test('a repeat after no answer, or a broken one, carries the same key', () => {
    const held = keys();
    expect(held.keyFor('/a', { b: 1 })).toBe('key-1');
    held.settle(refused(0));
    expect(held.keyFor('/a', { b: 1 })).toBe('key-1');
    held.settle(refused(502));
    expect(held.keyFor('/a', { b: 1 })).toBe('key-1');
  });
  test('a changed body, another path, or a settled answer takes a new one', () => {
    const held = keys();
    held.keyFor('/a', { b: 1 });
    expect(held.keyFor('/a', { b: 2 })).toBe('key-2');
    expect(held.keyFor('/c', { b: 2 })).toBe('key-3');
    held.settle(refused(400));
    expect(held.keyFor('/c', { b: 2 })).toBe('key-4');
    held.settle({ ok: true, status: 201, reply: {}, version: null });
    expect(held.keyFor('/c', { b: 2 })).toBe('key-5');
  });
  test('files are told apart by name, size and date', () => {
    const held = keys();
    const form = (name: string) => {
      const one = new FormData();
      one.set('file', new File(['1'], name, { lastModified: 5 }));
      return one;
    };
    expect(held.keyFor('/f', form('a.csv'))).toBe('key-1');
    expect(held.keyFor('/f', form('a.csv'))).toBe('key-1');
    expect(held.keyFor('/f', form('b.csv'))).toBe('key-2');
  });
});
