import { S3Client } from '@aws-sdk/client-s3';
import { storageEnv } from '@/lib/env/env';

function connect(endpoint: string): S3Client {
  const e = storageEnv();
  return new S3Client({
    endpoint,
    region: e.S3_REGION,
    forcePathStyle: e.S3_FORCE_PATH_STYLE,
    credentials: { accessKeyId: e.S3_ACCESS_KEY_ID, secretAccessKey: e.S3_SECRET_ACCESS_KEY },
    // Otherwise a presigned PUT carries the checksum of an empty body and is refused.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    maxAttempts: 4,
    requestHandler: { connectionTimeout: 3_000, requestTimeout: 60_000, throwOnRequestTimeout: true },
  });
}

let inner: S3Client | undefined;
let outer: S3Client | undefined;

/** Speaks to the store from this process. */
export const innerClient = () => (inner ??= connect(storageEnv().S3_ENDPOINT));
/** Signs addresses that a browser will use; it may know the store under another name. */
export const publicClient = () => (outer ??= connect(storageEnv().S3_PUBLIC_ENDPOINT));
