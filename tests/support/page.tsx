import { QueryClientProvider, type QueryClient } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import type { ReactNode } from 'react';
import { vi } from 'vitest';
import { createQueryClient } from '@/components/data/client.ts';
import { sessionQuery } from '@/components/data/sessions.ts';
import type { ProblemCode } from '@/shared/errors.ts';
import { problemCodes } from '@/shared/errors.ts';
import type { Role } from '@/shared/policy.ts';
import type { Session } from '@/shared/sessions.ts';

export const ids = {
  user: '019a0000-0000-7000-8000-000000000001',
  plant: '019a0000-0000-7000-8000-000000000002',
  machine: '019a0000-0000-7000-8000-000000000003',
  revision: '019a0000-0000-7000-8000-000000000004',
  plate: '019a0000-0000-7000-8000-000000000005',
  grade: '019a0000-0000-7000-8000-000000000006',
  report: '019a0000-0000-7000-8000-000000000007',
  strategy: '019a0000-0000-7000-8000-000000000008',
  other: '019a0000-0000-7000-8000-000000000009',
} as const;

export const sessionOf = (role: Role, more: Partial<Session> = {}): Session => ({
  user: { id: ids.user, name: 'Lead', mail: 'lead@quay.example' },
  plant: { id: ids.plant, name: 'Quay' },
  role,
  mayApprove: false,
  memberships: [{ plantId: ids.plant, plantName: 'Quay', role }],
  expiresAt: '2031-01-01T00:00:00Z',
  ...more,
});

/** Shows part of the product with somebody signed in; nothing is asked again by itself. */
export function show(page: ReactNode, role: Role | null = 'lead', prepare?: (client: QueryClient) => void) {
  const client = createQueryClient();
  client.setDefaultOptions({ queries: { ...client.getDefaultOptions().queries, retry: false } });
  client.setQueryData(sessionQuery().queryKey, role === null ? null : sessionOf(role));
  prepare?.(client);
  return { client, ...render(<QueryClientProvider client={client}>{page}</QueryClientProvider>) };
}

export type Asked = { method: string; path: string; headers: Headers; body: unknown };
export type Answer = Response | Error | Promise<Response>;

/** The server's side of `fetch`: each request is kept in the list and answered by `answer`. An Error is a lost connection. */
export function serveWith(answer: (asked: Asked) => Answer): Asked[] {
  const requests: Asked[] = [];
  vi.stubGlobal('fetch', async (input: string, init: RequestInit = {}) => {
    const asked: Asked = {
      method: init.method ?? 'GET',
      path: input,
      headers: new Headers(init.headers),
      body: typeof init.body === 'string' ? (JSON.parse(init.body) as unknown) : (init.body ?? null),
    };
    requests.push(asked);
    const given = await answer(asked);
    if (given instanceof Error) throw given;
    return given;
  });
  return requests;
}

export const json = (value: unknown, status = 200): Response =>
  new Response(JSON.stringify(value), { status, headers: { 'content-type': 'application/json' } });

export const problem = (
  code: ProblemCode,
  detail = 'Because.',
  errors?: readonly { pointer: string; detail: string }[],
): Response =>
  new Response(JSON.stringify({ type: `urn:problem:${code}`, code, detail, errors, ...problemCodes[code] }), {
    status: problemCodes[code].status,
    headers: { 'content-type': 'application/problem+json' },
  });

export const offline = (): Error => new TypeError('Failed to fetch');
