import { jwtVerify, SignJWT } from 'jose';
import { createHash, createHmac, randomBytes } from 'node:crypto';

/** What the cookie carries: a signed token around a random id. The signature keeps guesses away from the database; the row decides. */
export type Tokens = {
  make(expiresAt: Date): Promise<{ token: string; hash: string }>;
  /** SHA-256 of the token’s random id, hex: the key of its session’s row. Null when it is forged, torn or too old. */
  hashOf(token: string): Promise<string | null>;
  /** Keyed hash of a mail or network address, for counting tries without keeping whose they were. */
  keyOf(kind: 'account' | 'address', value: string): string;
};

const algorithm = 'HS256';
const audience = 'cinderpath';

export function createTokens(secret: string): Tokens {
  const key = new TextEncoder().encode(secret);
  return {
    make: async (expiresAt) => {
      const id = randomBytes(32).toString('base64url');
      const token = await new SignJWT({ sid: id })
        .setProtectedHeader({ alg: algorithm })
        .setAudience(audience)
        .setIssuedAt()
        .setExpirationTime(Math.floor(expiresAt.getTime() / 1000))
        .sign(key);
      return { token, hash: sha256(id) };
    },
    hashOf: async (token) => {
      try {
        const { payload } = await jwtVerify(token, key, { algorithms: [algorithm], audience });
        return typeof payload.sid === 'string' ? sha256(payload.sid) : null;
      } catch {
        return null;
      }
    },
    keyOf: (kind, value) => createHmac('sha256', key).update(kind).update('\0').update(value).digest('hex'),
  };
}

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');
