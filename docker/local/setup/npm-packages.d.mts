export function packagesAreCurrent(folder: string): boolean;
export function ensurePackages(folder: string): Promise<boolean>;
