export type FakeS3 = {
  readonly env: Readonly<
    Record<'S3_ENDPOINT' | 'S3_REGION' | 'S3_BUCKET' | 'S3_ACCESS_KEY_ID' | 'S3_SECRET_ACCESS_KEY', string>
  >;
  stop(): Promise<void>;
};
export function startFakeS3(given: { folder: string; port?: number }): Promise<FakeS3>;
