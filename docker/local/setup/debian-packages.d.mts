export function postgresFolders(): string[];
export function debianPackageIsThere(name: 'postgresql' | 'chromium'): boolean;
export class MissingPackageError extends Error {}
export function ensureDebianPackage(name: 'postgresql' | 'chromium'): Promise<boolean>;
