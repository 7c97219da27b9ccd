import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import {
  AdvicePanel,
  boughtFor,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_components/advice-panel';
import { revision } from './fixtures/revision';

const thicker = { text: 'Print a top of 3.2 mm.', mends: ['skin', 'walls'], costS: 1080, costG: 12.4 };
const { check } = revision();

describe('what would help', () => {
  it('says what a change mends and what it costs in printing', () => {
    expect(boughtFor(thicker)).toMatch(/^Mends Skin.*, .+; 0\.3\sh more, 12\sg more\.$/);
    expect(boughtFor({ ...thicker, costS: -7200, costG: 0.3 })).toMatch(/; 2\.0\sh less\.$/);
    expect(boughtFor({ ...thicker, costS: 0, costG: 0 })).toMatch(/; printing stays as it is\.$/);
  });

  it('lists the changes in their order, and what limits the template', () => {
    const life = 'It is limited by grip.';
    const advice = [thicker, { ...thicker, text: 'Sand the walls.' }];
    const html = renderToStaticMarkup(<AdvicePanel check={{ ...check, advice, life }} />);
    expect(html.indexOf('Print a top')).toBeLessThan(html.indexOf('Sand the walls'));
    expect(html).toContain(life);
  });

  it('says so where no change of the recipe helps, and is not there for older reports', () => {
    const html = renderToStaticMarkup(<AdvicePanel check={{ ...check, advice: [], life: 'Grip.' }} />);
    expect(html).toContain('the mesh is where to look');
    expect(renderToStaticMarkup(<AdvicePanel check={{ ...check, advice: [], life: null }} />)).toBe('');
  });
});
