import type { Readable } from 'node:stream';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  GetObjectCommand,
  HeadObjectCommand,
  PutObjectCommand,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { storageEnv } from '@/lib/env/env';
import { innerClient, publicClient } from './client';
import { contentDisposition } from './content-disposition';
import { guardStore, MissingObject } from './guard-store';

export type StoredPart = { number: number; etag: string };
export type ObjectHead = { bytes: number; contentType: string | undefined; etag: string };
export type DownloadName = { fileName: string; contentType: string; inline?: boolean };

const partLifeS = 15 * 60;
const downloadLifeS = 5 * 60;

/** Bytes in an S3-compatible store, under keys of lib/storage/keys.ts. Errors: AppError `store-unavailable`, MissingObject. */
export interface Store {
  /** Begins an upload in parts; the answer names it for all later calls. */
  startMultipart(key: string, contentType: string): Promise<string>;
  /** Address for one part of exactly `bytes` bytes, for fifteen minutes; the length is part of the signature. */
  presignPart(key: string, uploadId: string, number: number, bytes: number): Promise<string>;
  /** Sends one part from this process (packs); answers its ETag. */
  putPart(key: string, uploadId: string, number: number, bytes: Uint8Array): Promise<StoredPart>;
  /** Joins the parts in order of their numbers. Done before: no error. */
  completeMultipart(key: string, uploadId: string, parts: StoredPart[]): Promise<void>;
  /** Gives up an upload in parts; unknown or finished ones are let be. */
  abortMultipart(key: string, uploadId: string): Promise<void>;
  /** Address for reading one object, for five minutes, under the name that the reader shall see. */
  presignGet(key: string, name: DownloadName): Promise<string>;
  /** Writes a new object; keys are never reused, so an object of that name is never replaced. */
  put(key: string, bytes: Uint8Array, contentType: string): Promise<void>;
  getBytes(key: string): Promise<Uint8Array>;
  getStream(key: string, signal?: AbortSignal): Promise<Readable>;
  /** Null where there is no such object. */
  head(key: string): Promise<ObjectHead | null>;
}

/** The store of this deployment, from the environment. */
export function store(): Store {
  const Bucket = storageEnv().S3_BUCKET;
  const client = innerClient();

  const head: Store['head'] = async (Key) => {
    try {
      const found = await guardStore(Key, () => client.send(new HeadObjectCommand({ Bucket, Key })));
      return { bytes: found.ContentLength ?? 0, contentType: found.ContentType, etag: found.ETag ?? '' };
    } catch (error) {
      if (error instanceof MissingObject) return null;
      throw error;
    }
  };

  const getStream: Store['getStream'] = async (Key, abortSignal) => {
    const found = await guardStore(Key, () =>
      client.send(new GetObjectCommand({ Bucket, Key }), { abortSignal }),
    );
    return found.Body as Readable;
  };

  return {
    head,
    getStream,

    async getBytes(key) {
      return guardStore(key, async () => {
        const found = await client.send(new GetObjectCommand({ Bucket, Key: key }));
        return found.Body!.transformToByteArray();
      });
    },

    async put(Key, bytes, ContentType) {
      const command = new PutObjectCommand({ Bucket, Key, Body: bytes, ContentType, IfNoneMatch: '*' });
      try {
        await guardStore(Key, () => client.send(command));
      } catch (error) {
        // A repeat of our own request whose first answer was lost finds its object there.
        if ((error as { name?: string }).name !== 'PreconditionFailed') throw error;
        const there = await head(Key);
        if (there?.bytes !== bytes.byteLength) throw error;
      }
    },

    async startMultipart(Key, ContentType) {
      const made = await guardStore(Key, () =>
        client.send(new CreateMultipartUploadCommand({ Bucket, Key, ContentType })),
      );
      return made.UploadId!;
    },

    async presignPart(Key, UploadId, PartNumber, ContentLength) {
      const command = new UploadPartCommand({ Bucket, Key, UploadId, PartNumber, ContentLength });
      return getSignedUrl(publicClient(), command, {
        expiresIn: partLifeS,
        signableHeaders: new Set(['host', 'content-length']),
      });
    },

    async putPart(Key, UploadId, number, Body) {
      const command = new UploadPartCommand({ Bucket, Key, UploadId, PartNumber: number, Body });
      const sent = await guardStore(Key, () => client.send(command));
      return { number, etag: sent.ETag! };
    },

    async completeMultipart(Key, UploadId, parts) {
      const Parts = [...parts]
        .sort((a, b) => a.number - b.number)
        .map(({ number, etag }) => ({ PartNumber: number, ETag: etag }));
      try {
        await guardStore(Key, () =>
          client.send(
            new CompleteMultipartUploadCommand({ Bucket, Key, UploadId, MultipartUpload: { Parts } }),
          ),
        );
      } catch (error) {
        // The parts are gone once joined: a second call is told "no such upload", but the object stands.
        if (!(error instanceof MissingObject) || !(await head(Key))) throw error;
      }
    },

    async abortMultipart(Key, UploadId) {
      try {
        await guardStore(Key, () => client.send(new AbortMultipartUploadCommand({ Bucket, Key, UploadId })));
      } catch (error) {
        // A simple store may not know the call (405); its parts then wait for its own clearing.
        const status = (error as { $metadata?: { httpStatusCode?: number } }).$metadata?.httpStatusCode;
        if (!(error instanceof MissingObject) && status !== 405) throw error;
      }
    },

    async presignGet(Key, { fileName, contentType, inline }) {
      const command = new GetObjectCommand({
        Bucket,
        Key,
        ResponseContentDisposition: contentDisposition(fileName, inline),
        ResponseContentType: contentType,
        ResponseCacheControl: 'private, no-store',
      });
      return getSignedUrl(publicClient(), command, { expiresIn: downloadLifeS });
    },
  };
}
