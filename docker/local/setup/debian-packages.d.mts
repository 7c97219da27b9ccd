export function postgresFolders(): string[];
export class MissingPackageError extends Error {}
export function ensureDebianPackage(name: 'postgresql' | 'chromium'): Promise<boolean>;
