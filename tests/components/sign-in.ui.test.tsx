import { screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { keepCard, keptCard } from '@/components/data/kept-cards.ts';
import { sessionQuery } from '@/components/data/sessions.ts';
import { SignInScreen } from '@/components/shell/sign-in-screen.tsx';
import { json, problem, serveWith, sessionOf, show, offline, type Asked } from '../support/page.tsx';
import { cardOf } from '../support/cards.ts';

afterEach(() => vi.unstubAllGlobals());

const welcome = { demo: null };
const demo = {
  demo: { accounts: [{ mail: 'engineer@quay.example', role: 'engineer', plant: 'Quay' }], password: 'demo-password' },
};
const serve = (signIn: (asked: Asked) => Response | Error, greeting: unknown = welcome) =>
  serveWith((asked) => (asked.path === '/api/welcome' ? json(greeting) : signIn(asked)));

const mail = () => screen.getByLabelText<HTMLInputElement>('Mail address');
const password = () => screen.getByLabelText<HTMLInputElement>('Password');
const send = () => userEvent.click(screen.getByRole('button', { name: 'Sign in' }));

describe('the door', () => {
  it('asks for mail and password before it asks the server', async () => {
    const requests = serve(() => problem('wrong-credentials'));
    show(<SignInScreen next={null} />, null);
    await send();
    expect(await screen.findByText('Type your mail address.')).toBeTruthy();
    expect(screen.getByText('Type your password.')).toBeTruthy();
    expect(mail().getAttribute('aria-invalid')).toBe('true');
    expect(requests.filter((asked) => asked.method === 'POST')).toHaveLength(0);
  });

  it('says that a password is wrong and keeps what was typed', async () => {
    serve(() => problem('wrong-credentials', 'Try again.'));
    show(<SignInScreen next={null} />, null);
    await userEvent.type(mail(), 'lead@quay.example');
    await userEvent.type(password(), 'not this one');
    await send();
    expect(await screen.findByText('Mail address or password is wrong')).toBeTruthy();
    expect(mail().value).toBe('lead@quay.example');
    expect(password().value).toBe('not this one');
  });

  it('says how long to wait after too many tries', async () => {
    serve(
      () =>
        new Response(
          JSON.stringify({
            type: 'urn:problem:too-many',
            title: 'Too many tries',
            status: 429,
            code: 'too-many',
            detail: 'This account must wait.',
            retryAfter: 840,
          }),
          { status: 429 },
        ),
    );
    show(<SignInScreen next={null} />, null);
    await userEvent.type(mail(), 'lead@quay.example');
    await userEvent.type(password(), 'x');
    await send();
    expect(await screen.findByText(/Wait 14 minutes\./)).toBeTruthy();
  });

  it('says that the connection is lost, and nothing of the password', async () => {
    serve(() => offline());
    show(<SignInScreen next={null} />, null);
    await userEvent.type(mail(), 'lead@quay.example');
    await userEvent.type(password(), 'a secret');
    await send();
    expect(await screen.findByText('No connection')).toBeTruthy();
    expect(document.body.textContent).not.toContain('a secret');
  });

  it('lets in whoever is right, and goes where they were going', async () => {
    const requests = serve(() => json(sessionOf('engineer')));
    const { client } = show(<SignInScreen next="/machines" />, null);
    await userEvent.type(mail(), ' lead@quay.example ');
    await userEvent.type(password(), 'right password');
    await userEvent.keyboard('{Enter}');
    await waitFor(() => expect(screen.getByTestId('redirect').textContent).toBe('/machines'));
    expect(requests.find((asked) => asked.method === 'POST')?.body).toEqual({
      mail: 'lead@quay.example',
      password: 'right password',
    });
    expect(client.getQueryData(sessionQuery().queryKey)?.role).toBe('engineer');
  });

  it.each(['//elsewhere.example', '/\\elsewhere.example', 'https://elsewhere.example', '/sign-in'])(
    'does not lead to %s afterwards',
    (next) => {
      serve(() => problem('server-error'));
      show(<SignInScreen next={next} />, 'operator');
      expect(screen.getByTestId('redirect').textContent).toBe('/at-the-machine');
    },
  );

  it('fills the form with a demo account at a tap, on a demo only', async () => {
    serve(() => problem('server-error'), demo);
    show(<SignInScreen next={null} />, null);
    await userEvent.click(await screen.findByRole('button', { name: /engineer@quay\.example/ }));
    expect(mail().value).toBe('engineer@quay.example');
    expect(password().value).toBe('demo-password');
  });

  it('shows no accounts elsewhere', async () => {
    const requests = serve(() => problem('server-error'));
    show(<SignInScreen next={null} />, null);
    await waitFor(() => expect(requests).toHaveLength(1));
    expect(within(document.body).queryByText(/demo account/)).toBeNull();
  });

  it('shows the password only when asked to', async () => {
    serve(() => problem('server-error'));
    show(<SignInScreen next={null} />, null);
    expect(password().type).toBe('password');
    await userEvent.click(screen.getByLabelText('Show the password'));
    expect(password().type).toBe('text');
  });

  it('forgets the plate cards kept on this device when another person signs in', async () => {
    serve(() => json(sessionOf('operator')));
    show(<SignInScreen next={null} />, null);
    keepCard('/api/card?x', cardOf());
    await userEvent.type(mail(), 'operator@quay.example');
    await userEvent.type(password(), 'right password');
    await send();
    await screen.findByTestId('redirect');
    expect(keptCard('/api/card?x')).toBeNull();
  });
});
