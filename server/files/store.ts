import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  ListObjectsV2Command,
  PutObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3';
import { createHash, randomBytes } from 'node:crypto';
import type { Config } from '../config.ts';

export type StoredFile = {
  readonly key: string;
  readonly contentType: string;
  readonly bytes: number;
  readonly sha256: string;
};

/** The bucket. Keys are random: nothing of a file's name, plant or content can be read from one. */
export type FileStore = {
  put(bytes: Uint8Array, contentType: string): Promise<StoredFile>;
  get(key: string): Promise<Uint8Array>;
  remove(key: string): Promise<void>;
  list(): AsyncIterable<{ readonly key: string; readonly modifiedAt: Date }>;
  /** Throws when the bucket does not answer. */
  check(): Promise<void>;
  close(): void;
};

// The SDK warns at every start that its releases from 2027 on want a newer Node: a matter for whoever updates packages.
process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED ??= 'true';

export function createFileStore({ endpoint, region, bucket, credentials }: Config['s3']): FileStore {
  const client = new S3Client({
    region,
    ...(endpoint ? { endpoint, forcePathStyle: true } : {}),
    ...(credentials ? { credentials } : {}),
    // Stores that don't know the SDK's streamed checksums keep their framing as part of the file.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    maxAttempts: 3,
    requestHandler: { connectionTimeout: 2_000, requestTimeout: 10_000 },
  });
  return {
    put: async (bytes, contentType) => {
      const key = `${randomBytes(2).toString('hex')}/${randomBytes(24).toString('base64url')}`;
      await client.send(new PutObjectCommand({ Bucket: bucket, Key: key, Body: bytes, ContentType: contentType }));
      return { key, contentType, bytes: bytes.byteLength, sha256: sha256Of(bytes) };
    },
    get: async (key) => {
      const { Body } = await client.send(new GetObjectCommand({ Bucket: bucket, Key: key }));
      if (!Body) throw new Error(`the bucket answered without a body for ${key}`);
      return Body.transformToByteArray();
    },
    remove: async (key) => {
      await client.send(new DeleteObjectCommand({ Bucket: bucket, Key: key }));
    },
    list: async function* () {
      let token: string | undefined;
      do {
        const page = await client.send(new ListObjectsV2Command({ Bucket: bucket, ContinuationToken: token }));
        for (const { Key, LastModified } of page.Contents ?? []) {
          if (Key && LastModified) yield { key: Key, modifiedAt: LastModified };
        }
        token = page.NextContinuationToken;
      } while (token);
    },
    check: async () => {
      await client.send(new HeadBucketCommand({ Bucket: bucket }));
    },
    close: () => client.destroy(),
  };
}

export const sha256Of = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');
