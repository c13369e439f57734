import S3rver from 's3rver';
import account from 's3rver/lib/models/account.js';

export interface FakeS3Options {
  /** 0 takes a free one. */
  readonly port: number;
  /** Where the objects are kept, as files. */
  readonly dir: string;
  readonly bucket: string;
  /** Only requests that name this key are taken; the stand-in does not verify their signatures. */
  readonly accessKeyId: string;
  readonly secretAccessKey: string;
}

export interface FakeS3 {
  readonly endpoint: string;
  close(): Promise<void>;
}

/** A local stand-in for S3 on loopback, with the bucket made. */
export async function startFakeS3(options: FakeS3Options): Promise<FakeS3> {
  account.DUMMY_ACCOUNT.revokeAccessKey('S3RVER');
  account.DUMMY_ACCOUNT.createKeyPair(options.accessKeyId, options.secretAccessKey);
  const server = new S3rver({
    port: options.port,
    address: '127.0.0.1',
    directory: options.dir,
    silent: true,
    configureBuckets: [{ name: options.bucket, configs: [] }],
  });
  const { port } = await server.run();
  return { endpoint: `http://127.0.0.1:${port}`, close: () => server.close() };
}
