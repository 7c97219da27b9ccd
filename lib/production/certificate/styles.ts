import { StyleSheet } from '@react-pdf/renderer';
import { mono, sans } from './fonts';

export const ink = '#1D2321';
export const rule = '#B9B3A5';
export const hairline = '#D9D4C7';
export const slate = '#56616B';
export const verdigris = '#1F6F66';
export const madder = '#A2352B';
export const ochre = '#8A560C';
export const paper = '#F7F5F0';

export const statusColour: Record<string, string> = {
  pass: verdigris,
  caution: ochre,
  fail: madder,
  'not-run': slate,
};

// Families are lists: the second one has the letters that the first one lacks.
const text = sans as never;
const figures = mono as never;

// No line height anywhere: the renderer multiplies it anew in every pass that page numbers cause.
export const styles = StyleSheet.create({
  page: {
    paddingTop: 40,
    paddingBottom: 44,
    paddingHorizontal: 42,
    fontFamily: text,
    fontSize: 9,
    color: ink,
  },
  figures: { fontFamily: figures, fontSize: 7 },
  kicker: { fontSize: 8, color: slate },
  h1: { fontSize: 21, fontWeight: 600 },
  h2: { fontSize: 10.5, fontWeight: 600, marginTop: 16, marginBottom: 5 },
  lead: { fontSize: 9.5 },
  row: { flexDirection: 'row' },
  line: { borderTopWidth: 0.6, borderTopColor: hairline, paddingVertical: 4 },
  headLine: { borderTopWidth: 0.9, borderTopColor: ink, paddingVertical: 3 },
  label: { fontSize: 7.5, color: slate },
  strong: { fontWeight: 600 },
  muted: { color: slate },
  caution: { borderWidth: 0.9, borderColor: ochre, paddingVertical: 7, paddingHorizontal: 9, marginTop: 12 },
});
