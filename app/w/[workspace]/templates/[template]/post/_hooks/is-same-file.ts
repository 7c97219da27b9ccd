type Known = { fileName: string; bytes: number; lastModified: number | null };

/**
 * Whether a picked file is the one whose parts are in the store already: same name, size (bytes) and time of
 * its last change (ms since 1970). A time that was not kept is not compared.
 */
export function isSameFile(picked: Pick<File, 'name' | 'size' | 'lastModified'>, known: Known): boolean {
  if (picked.name !== known.fileName || picked.size !== known.bytes) return false;
  return known.lastModified === null || picked.lastModified === known.lastModified;
}
