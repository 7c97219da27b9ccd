import AxeBuilder from '@axe-core/playwright';
import type { Page } from 'playwright-core';

const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];

/**
 * Pins lie where the matter is, so two may lie close together. WCAG 2.2 (2.5.8) lets a target be smaller where the
 * same can be done by another one on the page: every pin's entry in the docket goes to the same place.
 */
const isPin = (html: string) => /aria-label="(must settle|to look at|settled): /.test(html);

/** What axe finds on a page as it stands, one line a rule; empty when nothing is wrong. */
export async function axeFindings(page: Page): Promise<string[]> {
  // What react-aria reads out while a button is at work may outlive the words that it refers to by a moment.
  const axe = new AxeBuilder({ page }).withTags(tags).exclude('[data-live-announcer]');
  const { violations } = await axe.analyze();
  return violations
    .map(({ id, nodes }) => ({ id, nodes: nodes.filter(({ html }) => id !== 'target-size' || !isPin(html)) }))
    .filter(({ nodes }) => nodes.length > 0)
    .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 160)).join(' | ')}`);
}
