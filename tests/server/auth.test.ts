import bcrypt from 'bcryptjs';
import { SignJWT } from 'jose';
import { afterAll, beforeEach, describe, expect, test, vi } from 'vitest';
import { networkOf } from '../../server/auth/network.ts';
import { createPasswords, type PasswordQuestion } from '../../server/auth/passwords.ts';
import { createTokens } from '../../server/auth/token.ts';

/** What the threads were asked; they answer as they do. */
const asked: PasswordQuestion[] = [];
vi.mock(import('../../server/workers/pool.ts'), async (original) => {
  const real = await original();
  return {
    ...real,
    createPool: (settings) => {
      const pool = real.createPool<never, never>(settings);
      return {
        ...pool,
        ask: (question) => {
          asked.push(question as PasswordQuestion); // only passwords ask here
          return pool.ask(question as never);
        },
      };
    },
  };
});
beforeEach(() => asked.splice(0));

describe('a password', () => {
  const cost = 5;
  const passwords = createPasswords(cost);
  afterAll(() => passwords.close());
  const rounds = () =>
    asked.map((question) => (question.kind === 'compare' ? bcrypt.getRounds(question.hash) : Number.NaN));

  test('is compared with as many rounds for an account nobody has as for a wrong password', async () => {
    const hash = await passwords.hash('the right password');
    asked.splice(0);
    expect(await passwords.matches('a wrong password', hash)).toBe(false);
    expect(await passwords.matches('a wrong password', null)).toBe(false);
    expect(rounds()).toEqual([cost, cost]);
  });

  test('is nobody’s when there is no account, not even the one that is compared with', async () => {
    expect(await passwords.matches('nobody has this password', null)).toBe(false);
    expect(rounds()).toEqual([cost]);
  });
});

describe('the network that tries to sign in', () => {
  test.each([
    ['an IPv4 address is itself', '192.0.2.7', '192.0.2.7', true],
    ['its neighbour is another', '192.0.2.7', '192.0.2.8', false],
    ['an IPv4 address is the same when a socket writes it as IPv6', '192.0.2.7', '::ffff:192.0.2.7', true],
    ['one household’s IPv6 addresses are one', '2001:db8:1:2::1', '2001:db8:1:2:aaaa:bbbb:cccc:dddd', true],
    ['however they are written', '2001:DB8:1:2::1', '2001:0db8:0001:0002:0:0:0:5', true],
    ['the household beside it is another', '2001:db8:1:2::1', '2001:db8:1:3::1', false],
    ['zones are of the device, not of the network', 'fe80::1%eth0', 'fe80::2%wlan0', true],
    ['what is no address is one network for all', 'unreadable', undefined, true],
    ['and not everybody’s', 'unreadable', '192.0.2.7', false],
  ])('%s', (_law, one, other, same) => {
    expect(networkOf(one) === networkOf(other)).toBe(same);
  });
});

describe('a token', () => {
  const secret = 's'.repeat(32);
  const tokens = createTokens(secret);
  const soon = () => new Date(Date.now() + 60_000);

  test('is known again by the hash it was made with', async () => {
    const { token, hash } = await tokens.make(soon());
    expect(await tokens.hashOf(token)).toBe(hash);
  });

  test.each([
    ['signed by another key', 'k'.repeat(32), 'cinderpath', 60],
    ['made for another use', secret, 'elsewhere', 60],
    ['whose time is over', secret, 'cinderpath', -60],
  ])('%s is nobody’s', async (_what, key, audience, seconds) => {
    const token = await new SignJWT({ sid: 'x'.repeat(43) })
      .setProtectedHeader({ alg: 'HS256' })
      .setAudience(audience)
      .setExpirationTime(Math.floor(Date.now() / 1000) + seconds)
      .sign(new TextEncoder().encode(key));
    expect(await tokens.hashOf(token)).toBeNull();
  });

  test('without an id, although signed by us, is nobody’s', async () => {
    const token = await new SignJWT({})
      .setProtectedHeader({ alg: 'HS256' })
      .setAudience('cinderpath')
      .setExpirationTime('1h')
      .sign(new TextEncoder().encode(secret));
    expect(await tokens.hashOf(token)).toBeNull();
  });

  test('leads to no address or account: they are hashed with the key, each kind for itself', () => {
    const key = tokens.keyOf('account', 'lead@quay.example');
    expect(key).toBe(createTokens(secret).keyOf('account', 'lead@quay.example'));
    expect(key).not.toBe(tokens.keyOf('address', 'lead@quay.example'));
    expect(key).not.toBe(createTokens('k'.repeat(32)).keyOf('account', 'lead@quay.example'));
  });
});
