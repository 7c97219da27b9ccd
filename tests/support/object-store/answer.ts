import type { IncomingMessage, ServerResponse } from 'node:http';
import type { Refusal } from '@/docker/local/store/verify-signature';

/** What an operation answers; the server adds request id and CORS headers. */
export interface Answer {
  status: number;
  headers?: Record<string, string>;
  body?: Buffer | string;
}

/** Thrown by an operation; becomes S3's XML error. */
export class StoreError extends Error implements Refusal {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}

export function xmlAnswer(root: string, content: string, status = 200): Answer {
  const body = `<?xml version="1.0" encoding="UTF-8"?>\n<${root} xmlns="http://s3.amazonaws.com/doc/2006-03-01/">${content}</${root}>`;
  return { status, headers: { 'content-type': 'application/xml' }, body };
}

export function errorAnswer({ status, code, message }: Refusal): Answer {
  return xmlAnswer('Error', `${tag('Code', code)}${tag('Message', message)}`, status);
}

export function tag(name: string, value: string | number | boolean): string {
  return `<${name}>${String(value).replace(/[<>&"']/g, (char) => `&#${char.charCodeAt(0)};`)}</${name}>`;
}

/** Reads a request's whole body; a body that breaks off is an error, never a short object. */
export async function readBody(request: IncomingMessage): Promise<Buffer> {
  const chunks: Buffer[] = [];
  for await (const chunk of request) chunks.push(chunk as Buffer);
  const body = Buffer.concat(chunks);
  const declared = request.headers['content-length'];
  if (!request.complete || (declared !== undefined && Number(declared) !== body.length)) {
    throw new StoreError(400, 'IncompleteBody', 'You did not provide the number of bytes you declared.');
  }
  return body;
}

export function send(
  request: IncomingMessage,
  response: ServerResponse,
  answer: Answer,
  extra: Record<string, string>,
) {
  const body = Buffer.from(answer.body ?? '');
  const headers: Record<string, string> = {
    'content-length': String(body.length),
    ...extra,
    ...answer.headers,
  };
  if (!request.complete) headers.connection = 'close';
  response.writeHead(answer.status, headers);
  response.end(
    request.method === 'HEAD' || answer.status === 204 || answer.status === 304 ? undefined : body,
  );
}
