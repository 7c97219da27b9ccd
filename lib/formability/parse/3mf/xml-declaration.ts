import { UnusableInput } from '../../unusable-input';

/** @throws UnusableInput unsupported where `<?xml …?>` names an encoding that the bytes are not read in. */
export function checkDeclaration(text: string, where: string, utf16: boolean): void {
  const named = /\sencoding\s*=\s*["']([^"']*)["']/i.exec(text)?.[1].toLowerCase();
  const known = utf16 ? ['utf-16', 'utf-16le', 'utf-16be'] : ['utf-8', 'us-ascii', 'ascii'];
  if (named === undefined || known.includes(named)) return;
  throw new UnusableInput('unsupported', `${where} is written in the encoding "${named.slice(0, 40)}"; 3MF parts are UTF-8 or UTF-16: save it again`); // prettier-ignore
}

/** Turns the chunks of a UTF-16 part, told by its byte order mark, into UTF-8; others pass as they are. */
export class Transcoder {
  utf16 = false;
  private decoder: TextDecoder | null = null;
  private begun = false;

  take(chunk: Uint8Array): Uint8Array {
    if (!this.begun) {
      this.begun = true;
      const order = chunk[0] === 0xff && chunk[1] === 0xfe ? 'utf-16le' : chunk[0] === 0xfe && chunk[1] === 0xff ? 'utf-16be' : null; // prettier-ignore
      if (order) this.decoder = new TextDecoder(order);
      this.utf16 = order !== null;
    }
    return this.decoder ? new TextEncoder().encode(this.decoder.decode(chunk, { stream: true })) : chunk;
  }
}
