import { existsSync } from 'node:fs';
import { readdir, readFile, rm, stat } from 'node:fs/promises';
import type { IncomingMessage, RequestListener, ServerResponse } from 'node:http';
import path from 'node:path';
import type S3rver from 's3rver';
import {
  decode,
  parseQuery,
  splitOnce,
  verifySignature,
  type Refusal,
  type StoreCredentials,
} from './verify-signature';

/**
 * Stands before s3rver and adds what it leaves out: signatures are checked, `If-None-Match: *` holds,
 * an upload in parts can be given up and its parts listed.
 */
export function strictFront(server: S3rver, credentials: StoreCredentials): RequestListener {
  const inner = server.callback();

  async function handle(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const method = request.method ?? 'GET';
    const url = request.url ?? '/';
    if (method === 'GET' && url === '/') return void response.end('Firstpull object store');
    // A preflight carries no signature; s3rver answers it from the bucket's CORS rules.
    if (method === 'OPTIONS') return inner(request, response);
    const refusal = verifySignature({ method, url, headers: request.headers }, credentials, new Date());
    if (refusal) return refuse(request, response, refusal);

    const [rawPath, rawQuery = ''] = splitOnce(url, '?');
    const [, bucket, ...rest] = rawPath.split('/').map(decode);
    const key = rest.join('/');
    const uploadId = parseQuery(rawQuery).find(([name]) => name === 'uploadId')?.[1];
    if (uploadId !== undefined && (method === 'DELETE' || method === 'GET')) {
      const folder = path.join(server.store.getResourcePath(bucket, undefined, 'uploads'), uploadId);
      if (!/^[0-9a-f]{32}$/.test(uploadId) || !existsSync(folder))
        return refuse(request, response, noSuchUpload);
      if (method === 'GET')
        return sendXml(request, response, 200, await listParts(folder, bucket, key, uploadId));
      await rm(folder, { recursive: true, force: true });
      response.writeHead(204, corsHeaders(request)).end();
      return;
    }
    const writesWhole = method === 'PUT' && uploadId === undefined && key !== '';
    if (
      writesWhole &&
      request.headers['if-none-match'] === '*' &&
      (await server.store.existsObject(bucket, key))
    ) {
      return refuse(request, response, alreadyThere);
    }
    inner(request, response);
  }

  return (request, response) => {
    handle(request, response).catch((error: Error) =>
      refuse(request, response, { status: 500, code: 'InternalError', message: error.message }),
    );
  };
}

const noSuchUpload: Refusal = {
  status: 404,
  code: 'NoSuchUpload',
  message: 'There is no such upload in parts.',
};
const alreadyThere: Refusal = {
  status: 412,
  code: 'PreconditionFailed',
  message: 'An object of that name is already there.',
};

async function listParts(folder: string, bucket: string, key: string, uploadId: string): Promise<string> {
  const numbers = (await readdir(folder)).filter(
    (name) => /^\d+$/.test(name) && existsSync(`${folder}/${name}.md5`),
  );
  const parts = await Promise.all(
    numbers
      .map(Number)
      .sort((a, b) => a - b)
      .map(async (number) => {
        const [etag, { size }] = await Promise.all([
          readFile(path.join(folder, `${number}.md5`), 'utf8'),
          stat(path.join(folder, String(number))),
        ]);
        return `<Part><PartNumber>${number}</PartNumber><ETag>"${etag}"</ETag><Size>${size}</Size></Part>`;
      }),
  );
  return (
    `<ListPartsResult><Bucket>${escape(bucket)}</Bucket><Key>${escape(key)}</Key><UploadId>${uploadId}</UploadId>` +
    `<IsTruncated>false</IsTruncated>${parts.join('')}</ListPartsResult>`
  );
}

function refuse(
  request: IncomingMessage,
  response: ServerResponse,
  { status, code, message }: Refusal,
): void {
  // The rest of a refused body is not waited for.
  if (!request.complete) response.setHeader('connection', 'close');
  sendXml(
    request,
    response,
    status,
    `<Error><Code>${code}</Code><Message>${escape(message)}</Message></Error>`,
  );
}

function sendXml(request: IncomingMessage, response: ServerResponse, status: number, body: string): void {
  const xml = `<?xml version="1.0" encoding="UTF-8"?>\n${body}`;
  response.writeHead(status, { 'content-type': 'application/xml', ...corsHeaders(request) }).end(xml);
}

/** Lets a page read a refusal; what the store serves itself carries the bucket's own rules. */
function corsHeaders(request: IncomingMessage): Record<string, string> {
  return request.headers.origin
    ? { 'access-control-allow-origin': request.headers.origin, vary: 'Origin' }
    : {};
}

const escape = (text: string) => text.replace(/[<>&"]/g, (char) => `&#${char.charCodeAt(0)};`);
