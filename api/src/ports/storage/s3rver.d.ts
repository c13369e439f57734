/** The parts of the local S3 server that are used here; the package brings no types. */
declare module 's3rver' {
  import type { AddressInfo } from 'node:net';

  export default class S3rver {
    constructor(options: {
      port: number;
      address: string;
      directory: string;
      silent: boolean;
      configureBuckets: { name: string; configs: string[] }[];
    });
    run(): Promise<AddressInfo>;
    close(): Promise<void>;
  }
}

declare module 's3rver/lib/models/account.js' {
  const account: {
    DUMMY_ACCOUNT: {
      createKeyPair(accessKeyId: string, secretAccessKey: string): void;
      revokeAccessKey(accessKeyId: string): void;
    };
  };
  export default account;
}
