import { type Budget, unpack } from './unpack';
import { Transcoder } from './xml-declaration';
import { type XmlHandler, XmlScanner } from './xml-scanner';
import { show, type ZipEntry } from './zip-directory';

/**
 * Unpacks one XML part of the archive and hands its elements to `handler`, in one pass.
 * @throws UnusableInput truncated, not_a_mesh, unsupported, too_large_file, and what the handler throws
 */
export function readPart(
  bytes: Uint8Array,
  entry: ZipEntry,
  budget: Budget,
  handler: XmlHandler,
  cap?: number,
): void {
  const transcoder = new Transcoder();
  let scanner: XmlScanner | null = null;
  unpack(
    bytes,
    entry,
    budget,
    (chunk) => {
      const text = transcoder.take(chunk);
      scanner ??= new XmlScanner(handler, show(entry.name), transcoder.utf16);
      scanner.write(text);
    },
    cap,
  );
  (scanner ?? new XmlScanner(handler, show(entry.name))).end();
}
