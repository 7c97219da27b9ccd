import type { Readable } from 'node:stream';
import { ZipArchive } from 'archiver';
import type { PackFile } from './pack-files';

export type ZipMesh = { name: string; stream: Readable };

/**
 * The archive as a stream: files in the given order with one date, so that the same content gives the same
 * bytes. An error of the mesh's stream ends the archive with that error.
 */
export function zipPack(files: PackFile[], mesh: ZipMesh, date: Date): ZipArchive {
  const archive = new ZipArchive({ zlib: { level: 6 }, forceZip64: false });
  const entry = (name: string) => ({ name, date, mode: 0o644 });
  mesh.stream.on('error', (error) => archive.destroy(error));
  archive.append(mesh.stream, entry(mesh.name));
  for (const { name, bytes } of files) archive.append(Buffer.from(bytes), entry(name));
  // A failure reaches whoever reads the archive; finalize's own promise would report it a second time.
  archive.finalize().catch(() => undefined);
  return archive;
}
