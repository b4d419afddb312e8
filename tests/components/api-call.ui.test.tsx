import { afterEach, describe, expect, it, vi } from 'vitest';
import { apiAddress, apiCall } from '@/components/data/call.ts';
import { ApiProblem } from '@/components/data/problem.ts';
import { cardEndpoints } from '@/shared/cards.ts';
import { gradeEndpoints, machineEndpoints } from '@/shared/machines.ts';
import { plateEndpoints } from '@/shared/plates.ts';
import { reportEndpoints } from '@/shared/reports.ts';
import { ids, json, offline, problem, serveWith } from '../support/page.tsx';

const grade = { id: ids.grade, name: 'S355J2+N', group: 'S355' };
const key = 'idempotency-key';

const caught = async (promise: Promise<unknown>): Promise<ApiProblem> => {
  const error: unknown = await promise.then(
    () => null,
    (thrown: unknown) => thrown,
  );
  if (!(error instanceof ApiProblem)) throw new Error('no ApiProblem was thrown', { cause: error });
  return error;
};

afterEach(() => vi.unstubAllGlobals());

describe('an API call', () => {
  it('keeps its key when the connection was lost and the same content is sent again', async () => {
    let answers = 0;
    const requests = serveWith(() => (answers++ === 0 ? offline() : json(grade, 201)));
    expect((await caught(apiCall(gradeEndpoints.add, { body: grade }))).code).toBe('lost-connection');
    await apiCall(gradeEndpoints.add, { body: grade });
    expect(requests[0]?.headers.get(key)).toMatch(/^[0-9a-f-]{36}$/);
    expect(requests[1]?.headers.get(key)).toBe(requests[0]?.headers.get(key));
  });

  it('takes another key for other content, since the first may have been done', async () => {
    const requests = serveWith(() => offline());
    await caught(apiCall(gradeEndpoints.add, { body: grade }));
    await caught(apiCall(gradeEndpoints.add, { body: { ...grade, name: 'S355K2' } }));
    expect(requests[1]?.headers.get(key)).not.toBe(requests[0]?.headers.get(key));
  });

  it('begins a new attempt after a definite no', async () => {
    const requests = serveWith(() => problem('already-there'));
    await caught(apiCall(gradeEndpoints.add, { body: grade }));
    await caught(apiCall(gradeEndpoints.add, { body: grade }));
    expect(requests[1]?.headers.get(key)).not.toBe(requests[0]?.headers.get(key));
  });

  it.each(['in-progress', 'server-error', 'unavailable'] as const)(
    'keeps its key after %s, when nobody knows whether it was done',
    async (code) => {
      const requests = serveWith(() => problem(code));
      await caught(apiCall(gradeEndpoints.add, { body: { ...grade, name: code } }));
      await caught(apiCall(gradeEndpoints.add, { body: { ...grade, name: code } }));
      expect(requests[1]?.headers.get(key)).toBe(requests[0]?.headers.get(key));
    },
  );

  it('names the version that was seen in If-Match, and refuses to send without one', async () => {
    const plate = {
      tag: 'B-2207',
      gradeId: ids.grade,
      heatNumber: '',
      nominalThickness: 20_000,
      measuredThickness: null,
      surface: 'rust' as const,
      certificate: '',
      length: null,
      width: null,
    };
    const answer = { id: ids.plate, version: 8, ...plate, grade, changedAt: '2031-01-01T00:00:00Z' };
    const requests = serveWith(() => json(answer));
    await apiCall(plateEndpoints.change, { params: { plateId: ids.plate }, body: plate, version: 7 });
    expect(requests[0]).toMatchObject({ method: 'PUT', path: `/api/plates/${ids.plate}`, body: plate });
    expect(requests[0]?.headers.get('if-match')).toBe('"7"');
    await expect(apiCall(plateEndpoints.change, { params: { plateId: ids.plate }, body: plate })).rejects.toThrow(
      RangeError,
    );
    expect(requests).toHaveLength(1);
  });

  it('brings a problem with its fields as the server said it', async () => {
    serveWith(() => problem('invalid-fields', 'One field.', [{ pointer: '/name', detail: 'A name is needed.' }]));
    const error = await caught(apiCall(gradeEndpoints.add, { body: grade }));
    expect(error).toMatchObject({ code: 'invalid-fields', status: 400, detail: 'One field.' });
    expect(error.fields).toEqual([{ pointer: '/name', detail: 'A name is needed.' }]);
  });

  it('does not let an answer of another shape in', async () => {
    serveWith(() => json({ items: [{ id: 'no id', name: 3 }] }));
    expect((await caught(apiCall(machineEndpoints.list, {}))).code).toBe('unreadable-answer');
  });

  it('does not take a page of a proxy for an answer', async () => {
    serveWith(() => new Response('<html>', { status: 200 }));
    expect((await caught(apiCall(machineEndpoints.list, {}))).code).toBe('unreadable-answer');
    serveWith(() => new Response('<html>Bad gateway', { status: 502 }));
    expect((await caught(apiCall(machineEndpoints.list, {}))).code).toBe('lost-connection');
  });

  it('sends a picture beside the data, both by name', async () => {
    const requests = serveWith(() => problem('bad-photo'));
    const body = {
      id: ids.report,
      revisionId: ids.revision,
      machineId: ids.machine,
      plateId: null,
      kind: 'erupted' as const,
      words: '',
    };
    const photo = new File(['x'], 'crater.jpg', { type: 'image/jpeg' });
    await caught(apiCall(reportEndpoints.add, { body, file: photo }));
    const sent = requests[0]?.body;
    expect(sent).toBeInstanceOf(FormData);
    if (!(sent instanceof FormData)) return;
    const data = sent.get('data');
    expect(typeof data === 'string' ? JSON.parse(data) : null).toEqual(body);
    expect(sent.get('photo')).toMatchObject({ name: 'crater.jpg' });
    expect(requests[0]?.headers.get('content-type')).toBeNull(); // the browser writes it, with the boundary
  });

  it('writes what is asked for into the address, safely', () => {
    expect(apiAddress(cardEndpoints.get, { query: { machineId: ids.machine, tag: 'B 2/7&x=1' } })).toBe(
      `/api/card?machineId=${ids.machine}&tag=B+2%2F7%26x%3D1`,
    );
    expect(apiAddress(machineEndpoints.get, { params: { machineId: '../people' } })).toBe('/api/machines/..%2Fpeople');
  });
});
