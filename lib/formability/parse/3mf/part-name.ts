/**
 * A part name as a key (OPC, ECMA-376 part 2, §9.1.1): no leading slash, compared without regard to ASCII case, `%41`
 * the same as `A`. Null for what can be no part's name: empty, `.` or `..` segments, backslashes, control
 * characters, encoded slashes, drive letters.
 */
export function partKey(name: string): string | null {
  const plain = unescape(name.startsWith('/') ? name.slice(1) : name);
  if (plain === null || plain.length > 1024) return null;
  if (/[\\\u0000-\u001f\u007f:]/.test(plain)) return null;
  const segments = plain.split('/');
  if (segments.some((segment) => segment === '' || /^\.+$/.test(segment))) return null;
  return plain.replace(/[A-Z]/g, (letter) => letter.toLowerCase());
}

/** A target as a relationship of the package or of the part `from` gives it; null where it leads to no part. */
export function resolveTarget(from: string, target: string): string | null {
  if (target.startsWith('/')) return partKey(target);
  const base = from.split('/').slice(0, -1);
  for (const segment of target.split('/')) {
    if (segment === '.') continue;
    if (segment !== '..') base.push(segment);
    else if (base.pop() === undefined) return null;
  }
  return partKey(base.join('/'));
}

function unescape(name: string): string | null {
  if (!name.includes('%')) return name;
  if (/%(2f|5c|00)/i.test(name)) return null;
  try {
    return decodeURIComponent(name);
  } catch {
    return null;
  }
}
