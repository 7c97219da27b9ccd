declare module 's3rver' {
  import type { RequestListener } from 'node:http';

  interface S3rverOptions {
    directory: string;
    silent: boolean;
    vhostBuckets: boolean;
    configureBuckets: { name: string; configs: string[] }[];
  }

  export default class S3rver {
    constructor(options: S3rverOptions);
    readonly store: {
      existsObject(bucket: string, key: string): Promise<boolean>;
      getResourcePath(bucket: string, key: string | undefined, resource: string): string;
    };
    configureBuckets(): Promise<unknown>;
    callback(): RequestListener;
  }
}

declare module 's3rver/lib/models/account.js' {
  export const DUMMY_ACCOUNT: {
    createKeyPair(accessKeyId: string, secretAccessKey: string): void;
    revokeAccessKey(accessKeyId: string): void;
  };
}
