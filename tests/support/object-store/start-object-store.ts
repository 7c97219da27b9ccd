import { randomBytes } from 'node:crypto';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import {
  decode,
  parseQuery,
  splitOnce,
  verifySignature,
  type StoreCredentials,
} from '@/docker/local/store/verify-signature';
import { errorAnswer, readBody, send, StoreError, xmlAnswer, type Answer } from './answer';
import { Bucket, type OpenUpload, type StoredVersion } from './bucket';
import { Faults, sendTruncated, unavailable } from './faults';
import {
  abortUpload,
  completeUpload,
  createUpload,
  listParts,
  listUploads,
  uploadPart,
} from './multipart-operations';
import { deleteObject, getObject, listObjects, putObject, type Call } from './object-operations';

export interface ObjectStoreOptions {
  bucket?: string;
  /** Pages that may call it from a browser; none if not given. */
  origins?: string[];
  /** The server's clock, against which signatures expire. */
  clock?: () => Date;
}

export interface ObjectStore {
  endpoint: string;
  bucket: string;
  credentials: StoreCredentials;
  /** The variables of lib/env that lead to it. */
  env: Record<string, string>;
  faults: Faults;
  /** Every request so far, as `GET /bucket/key?query 200`. */
  requests: string[];
  object(key: string): StoredVersion | undefined;
  versions(key: string): StoredVersion[];
  keys(): string[];
  openUploads(): OpenUpload[];
  stop(): Promise<void>;
}

/**
 * A strict stand-in for S3, for tests: real signatures, signed headers, expiry, digests, versions, retention,
 * conditional writes, uploads in parts, ranges, CORS, and faults on demand. Nothing outlives the process.
 */
export async function startObjectStore(options: ObjectStoreOptions = {}): Promise<ObjectStore> {
  const { bucket: bucketName = 'firstpull', origins = [], clock = () => new Date() } = options;
  const bucket = new Bucket();
  const faults = new Faults();
  const requests: string[] = [];
  const credentials = {
    accessKeyId: `TEST${randomBytes(8).toString('hex').toUpperCase()}`,
    secretAccessKey: randomBytes(30).toString('base64url'),
  };

  async function handle(request: IncomingMessage): Promise<Answer> {
    const method = request.method ?? 'GET';
    const url = request.url ?? '/';
    if (method === 'OPTIONS') return preflight(request, origins);
    const refusal = verifySignature({ method, url, headers: request.headers }, credentials, clock());
    if (refusal) return errorAnswer(refusal);
    const [path, rawQuery = ''] = splitOnce(url, '?');
    const [, name, ...rest] = path.split('/').map(decode);
    if (name !== bucketName)
      throw new StoreError(404, 'NoSuchBucket', 'The specified bucket does not exist.');
    return operate(bucket, {
      method,
      bucketName,
      key: rest.join('/'),
      query: Object.fromEntries(parseQuery(rawQuery)),
      headers: request.headers as Record<string, string | undefined>,
      body: await readBody(request),
      now: clock(),
    });
  }

  async function respond(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const fault = faults.take(request.method ?? 'GET', request.url ?? '/');
    if (fault?.kind === 'hold') await fault.released;
    if (fault?.kind === 'reset') return void request.socket.destroy();
    const answer = fault?.kind === 'unavailable' ? unavailable : await handle(request).catch(asAnswer);
    requests.push(`${request.method} ${request.url} ${answer.status}`);
    if (fault?.kind === 'truncated') return sendTruncated(request, response, answer);
    send(request, response, answer, {
      'x-amz-request-id': randomBytes(8).toString('hex'),
      ...cors(request, origins),
    });
  }

  const server = createServer(
    (request, response) => void respond(request, response).catch(() => response.destroy()),
  );
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const endpoint = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  return {
    endpoint,
    bucket: bucketName,
    credentials,
    env: {
      S3_ENDPOINT: endpoint,
      S3_PUBLIC_ENDPOINT: endpoint,
      S3_REGION: 'us-east-1',
      S3_BUCKET: bucketName,
      S3_ACCESS_KEY_ID: credentials.accessKeyId,
      S3_SECRET_ACCESS_KEY: credentials.secretAccessKey,
      S3_FORCE_PATH_STYLE: 'true',
    },
    faults,
    requests,
    object: (key) => bucket.latest(key),
    versions: (key) => bucket.versions.get(key) ?? [],
    keys: () => bucket.keys(),
    openUploads: () => [...bucket.uploads.values()],
    stop: () =>
      new Promise((resolve) => {
        faults.clear();
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

function operate(bucket: Bucket, call: Call): Answer {
  const { method, key, query } = call;
  const inParts = query.uploadId !== undefined;
  if (key === '') {
    if (method === 'GET' && query['list-type'] === '2') return listObjects(bucket, call);
    if (method === 'GET' && query.uploads !== undefined) return listUploads(bucket, call);
    if (method === 'HEAD') return { status: 200 };
    if (method === 'PUT') return { status: 200 };
  } else if (method === 'PUT') {
    return inParts ? uploadPart(bucket, call) : putObject(bucket, call);
  } else if (method === 'GET' || method === 'HEAD') {
    return inParts ? listParts(bucket, call) : getObject(bucket, call);
  } else if (method === 'DELETE') {
    return inParts ? abortUpload(bucket, call) : deleteObject(bucket, call);
  } else if (method === 'POST' && query.uploads !== undefined) {
    return createUpload(bucket, call);
  } else if (method === 'POST' && inParts) {
    return completeUpload(bucket, call);
  }
  throw new StoreError(405, 'MethodNotAllowed', 'The specified method is not allowed against this resource.');
}

function asAnswer(error: unknown): Answer {
  if (error instanceof StoreError) return errorAnswer(error);
  return errorAnswer({ status: 500, code: 'InternalError', message: String(error) });
}

function preflight(request: IncomingMessage, origins: string[]): Answer {
  const allowed = cors(request, origins);
  if (!allowed['access-control-allow-origin']) {
    return xmlAnswer(
      'Error',
      '<Code>AccessForbidden</Code><Message>This origin is not allowed.</Message>',
      403,
    );
  }
  return {
    status: 200,
    headers: {
      ...allowed,
      'access-control-allow-methods': 'GET, PUT, HEAD',
      'access-control-allow-headers': request.headers['access-control-request-headers'] ?? '',
    },
  };
}

function cors(request: IncomingMessage, origins: string[]): Record<string, string> {
  const origin = request.headers.origin;
  if (!origin || !origins.includes(origin)) return {};
  return { 'access-control-allow-origin': origin, 'access-control-expose-headers': 'ETag', vary: 'Origin' };
}
