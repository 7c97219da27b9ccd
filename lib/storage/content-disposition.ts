/**
 * `Content-Disposition` for a download (RFC 6266): a plain ASCII name for old readers, and the exact one
 * in UTF-8 (RFC 8187). Path separators and control characters never reach either.
 */
export function contentDisposition(fileName: string, inline = false): string {
  const name = fileName.replace(/[\u0000-\u001f\u007f/\\]/g, '_').slice(0, 200) || 'file';
  const plain = name.replace(/[^\x20-\x7e]|["%]/g, '_');
  const exact = encodeURIComponent(name).replace(
    /['()*]/g,
    (char) => `%${char.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `${inline ? 'inline' : 'attachment'}; filename="${plain}"; filename*=UTF-8''${exact}`;
}
