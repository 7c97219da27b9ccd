import type { Rgb } from './cividis';

/** The paper-and-ink colours of rendered pictures (the light theme's, so that a picture prints as it looks). */
export const PAPER: Rgb = [0xfe, 0xfd, 0xfa];
export const INK: Rgb = [0x1d, 0x23, 0x21];
export const MADDER: Rgb = [0xa2, 0x35, 0x2b];
/** Plain template: the lit and the turned-away tone. */
export const CLAY_LIGHT: Rgb = [0xf1, 0xec, 0xdf];
export const CLAY_DARK: Rgb = [0x9a, 0x95, 0x87];

export function mix(a: Rgb, b: Rgb, t: number): Rgb {
  return [a[0] + (b[0] - a[0]) * t, a[1] + (b[1] - a[1]) * t, a[2] + (b[2] - a[2]) * t];
}
