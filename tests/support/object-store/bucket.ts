import { createHash, randomUUID } from 'node:crypto';
import { crc32 } from 'node:zlib';
import { StoreError } from './answer';

export interface StoredVersion {
  key: string;
  versionId: string;
  /** null marks a deletion: the key reads as absent, older versions are still there. */
  body: Buffer | null;
  etag: string;
  at: Date;
  /** Content type, disposition and x-amz-meta-* as they were sent. */
  headers: Record<string, string>;
  retainUntil?: Date;
}

export interface OpenUpload {
  id: string;
  key: string;
  headers: Record<string, string>;
  parts: Map<number, { etag: string; body: Buffer }>;
}

/** A versioned bucket in memory. */
export class Bucket {
  readonly versions = new Map<string, StoredVersion[]>();
  readonly uploads = new Map<string, OpenUpload>();

  latest(key: string): StoredVersion | undefined {
    const last = this.versions.get(key)?.at(-1);
    return last?.body ? last : undefined;
  }

  find(key: string, versionId: string | undefined): StoredVersion {
    const found = versionId
      ? this.versions.get(key)?.find((one) => one.versionId === versionId)
      : this.latest(key);
    if (!found?.body) {
      if (versionId) throw new StoreError(404, 'NoSuchVersion', 'The specified version does not exist.');
      throw new StoreError(404, 'NoSuchKey', 'The specified key does not exist.');
    }
    return found;
  }

  add(
    key: string,
    body: Buffer | null,
    etag: string,
    headers: Record<string, string>,
    at: Date,
  ): StoredVersion {
    const until = headers['x-amz-object-lock-retain-until-date'];
    const version: StoredVersion = {
      key,
      versionId: randomUUID().replaceAll('-', ''),
      body,
      etag,
      at,
      headers,
      ...(until ? { retainUntil: new Date(until) } : {}),
    };
    this.versions.set(key, [...(this.versions.get(key) ?? []), version]);
    return version;
  }

  removeVersion(key: string, versionId: string, now: Date): void {
    const all = this.versions.get(key) ?? [];
    const one = all.find((version) => version.versionId === versionId);
    if (one?.retainUntil && one.retainUntil > now) {
      throw new StoreError(403, 'AccessDenied', 'The version is locked until its retention ends.');
    }
    const rest = all.filter((version) => version.versionId !== versionId);
    if (rest.length > 0) this.versions.set(key, rest);
    else this.versions.delete(key);
  }

  keys(): string[] {
    return [...this.versions.keys()].filter((key) => this.latest(key)).sort();
  }

  upload(id: string, key: string): OpenUpload {
    const upload = this.uploads.get(id);
    if (upload?.key === key) return upload;
    throw new StoreError(404, 'NoSuchUpload', 'The specified upload does not exist.');
  }
}

export const md5 = (body: Buffer) => createHash('md5').update(body).digest('hex');

/** `If-None-Match: *` on a write: never over an object that is there. */
export function refuseIfThere(bucket: Bucket, key: string, ifNoneMatch: string | undefined): void {
  if (ifNoneMatch === '*' && bucket.latest(key)) {
    throw new StoreError(
      412,
      'PreconditionFailed',
      'At least one of the preconditions you specified did not hold.',
    );
  }
}

const digests: Record<string, (body: Buffer) => string> = {
  'content-md5': (body) => createHash('md5').update(body).digest('base64'),
  'x-amz-checksum-sha1': (body) => createHash('sha1').update(body).digest('base64'),
  'x-amz-checksum-sha256': (body) => createHash('sha256').update(body).digest('base64'),
  'x-amz-checksum-crc32': (body) => {
    const sum = Buffer.alloc(4);
    sum.writeUInt32BE(crc32(body));
    return sum.toString('base64');
  },
};

/** Every digest that a write names, in a header or in the signed address, must be that of its bytes. */
export function checkDigests(body: Buffer, named: Record<string, string | undefined>): void {
  const hash = named['x-amz-content-sha256'];
  if (hash?.startsWith('STREAMING-') || named['content-encoding']?.includes('aws-chunked')) {
    throw new StoreError(
      501,
      'NotImplemented',
      'Chunked signing is not supported; send the bytes as they are.',
    );
  }
  if (hash && hash !== 'UNSIGNED-PAYLOAD' && hash !== createHash('sha256').update(body).digest('hex')) {
    throw new StoreError(
      400,
      'XAmzContentSHA256Mismatch',
      'The SHA-256 you signed is not that of the bytes.',
    );
  }
  for (const [name, digest] of Object.entries(digests)) {
    if (named[name] !== undefined && named[name] !== digest(body)) {
      throw new StoreError(400, 'BadDigest', `The ${name} you specified did not match what was received.`);
    }
  }
}
