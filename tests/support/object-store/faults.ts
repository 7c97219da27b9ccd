import type { IncomingMessage, ServerResponse } from 'node:http';
import { errorAnswer, send, type Answer } from './answer';

export type FaultKind =
  /** 503 SlowDown, as S3 answers under load. */
  | 'unavailable'
  /** The connection breaks before any answer. */
  | 'reset'
  /** The answer's headers promise the whole body, the connection breaks half-way. */
  | 'truncated'
  /** Nothing is answered until `release` is called. */
  | 'hold';

export interface FaultRule {
  kind: FaultKind;
  method?: string;
  /** Matched against the path and query as they came. */
  url?: RegExp;
  /** How many requests it hits; 1 if not given. */
  times?: number;
}

export interface Fault extends FaultRule {
  /** Requests hit so far. */
  readonly hits: number;
  /** Lets held requests go on. */
  release(): void;
}

/** Faults that a test plants; each hits the next requests that match it. */
export class Faults {
  private planted: { fault: Fault; hit: () => void; released: Promise<void> }[] = [];

  plant(rule: FaultRule): Fault {
    let hits = 0;
    let release: () => void = () => undefined;
    const released = new Promise<void>((resolve) => (release = resolve));
    const fault: Fault = {
      ...rule,
      release,
      get hits() {
        return hits;
      },
    };
    this.planted.push({ fault, hit: () => (hits += 1), released });
    return fault;
  }

  clear(): void {
    this.planted.forEach(({ fault }) => fault.release());
    this.planted = [];
  }

  /** The fault that hits this request, if one does. */
  take(method: string, url: string): { kind: FaultKind; released: Promise<void> } | undefined {
    const found = this.planted.find(
      ({ fault }) =>
        fault.hits < (fault.times ?? 1) &&
        (!fault.method || fault.method === method) &&
        (!fault.url || fault.url.test(url)),
    );
    found?.hit();
    return found && { kind: found.fault.kind, released: found.released };
  }
}

export const unavailable: Answer = errorAnswer({
  status: 503,
  code: 'SlowDown',
  message: 'Reduce your request rate.',
});

/** Sends the headers of a whole answer and half of its body, then breaks the connection. */
export function sendTruncated(request: IncomingMessage, response: ServerResponse, answer: Answer): void {
  const body = Buffer.from(answer.body ?? '');
  if (body.length < 2) return send(request, response, answer, {});
  response.writeHead(answer.status, { ...answer.headers, 'content-length': String(body.length) });
  response.write(body.subarray(0, body.length >> 1), () => response.destroy());
}
