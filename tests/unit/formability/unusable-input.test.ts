import canonicalize from 'canonicalize';
import { describe, expect, it } from 'vitest';
import { inspect } from '@/lib/formability/inspect';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { modelXml, objectXml, packed } from '../../fixtures/meshes/write-3mf';
import { refusal } from './run-engine';

describe('the words of an input that cannot be used', () => {
  it('are well-formed where a cut leaves half of a pair; whole pairs stay', () => {
    const error = new UnusableInput('not_a_mesh', 'a \ud83d b \udc49 c 👉', ['x\ud83d', '👉']);
    expect(error.message).toBe('a \ufffd b \ufffd c 👉');
    expect(error.reasons).toEqual(['x\ufffd', '👉']);
    expect(canonicalize({ message: error.message, reasons: error.reasons })).toContain('👉');
  });

  it('are so for a 3MF whose object has an emoji at the cut of its name', () => {
    const name = `${'n'.repeat(39)}👉 tray`;
    const bad = '<mesh><vertices><vertex x="far" y="0" z="0"/></vertices><triangles/></mesh>';
    const found = refusal(() => inspect(packed(modelXml([objectXml(1, bad, `name="${name}"`)]))));
    expect(found.message).toContain(`("${'n'.repeat(39)}\ufffd")`);
    expect(found.message).not.toMatch(/\p{Surrogate}/u);
  });
});
