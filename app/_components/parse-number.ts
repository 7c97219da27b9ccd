export type ParsedNumber = { ok: true; value: number | null } | { ok: false; problem: string };

/**
 * Reads a decimal that a person typed: `0.8`, `0,8`, `-3`, `.5`. A comma before exactly three digits could mean a
 * thousand as well as a decimal, so it is asked about and never guessed. Empty text is `null`.
 */
export function parseNumber(text: string): ParsedNumber {
  const trimmed = text.trim().replace(/^\u2212/, '-');
  if (trimmed === '') return { ok: true, value: null };
  if (/^[+-]?[1-9]\d{0,2},\d{3}$/.test(trimmed)) {
    return {
      ok: false,
      problem: `“${trimmed}” can be read two ways. Write ${trimmed.replace(',', '')} or ${trimmed.replace(',', '.')}.`,
    };
  }
  if (!/^[+-]?(\d+([.,]\d*)?|[.,]\d+)$/.test(trimmed)) {
    return {
      ok: false,
      problem: `“${trimmed.slice(0, 24)}” is not a number. Write digits with one decimal point, such as 0.8.`,
    };
  }
  const value = Number(trimmed.replace(',', '.'));
  if (!Number.isFinite(value)) return { ok: false, problem: 'This number is too large. Write fewer digits.' };
  return { ok: true, value };
}
