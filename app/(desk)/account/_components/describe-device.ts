const browsers: [RegExp, string][] = [
  [/\bEdgA?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bSamsungBrowser\//, 'Samsung Internet'],
  [/\b(Firefox|FxiOS)\//, 'Firefox'],
  [/\b(Chrome|Chromium|CriOS|HeadlessChrome)\//, 'Chrome'],
  [/\bVersion\/[\d.]+.*Safari\//, 'Safari'],
];
const systems: [RegExp, string][] = [
  [/\biPad\b/, 'iPad'],
  [/\biPhone\b/, 'iPhone'],
  [/\bAndroid\b/, 'Android'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b/, 'macOS'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bLinux\b/, 'Linux'],
];

/** `Firefox on Windows` from a User-Agent header; a hint for its owner, never a proof. */
export function describeDevice(userAgent: string | null | undefined): string {
  const find = (list: [RegExp, string][]) => list.find(([pattern]) => pattern.test(userAgent ?? ''))?.[1];
  const browser = find(browsers);
  const system = find(systems);
  if (browser && system) return `${browser} on ${system}`;
  return browser ?? system ?? 'Unknown device';
}
