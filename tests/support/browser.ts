import { existsSync, mkdirSync } from 'node:fs';
import path from 'node:path';
import {
  chromium,
  type Browser,
  type BrowserContext,
  type BrowserContextOptions,
  type Page,
} from 'playwright-core';
import { afterAll, inject } from 'vitest';
import { outFolder } from './out-folder';

const executable = '/usr/bin/chromium';

let opened: Promise<Browser> | undefined;

/** Debian's Chromium, headless, one for a test file; closed at its end. */
export function browser(): Promise<Browser> {
  if (!existsSync(executable)) throw new Error('Chromium is missing; install Debian’s package "chromium".');
  opened ??= chromium.launch({
    executablePath: executable,
    args: [
      '--no-sandbox',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      '--no-first-run',
    ],
  });
  return opened;
}

afterAll(async () => {
  await (await opened)?.close();
  opened = undefined;
});

/**
 * A visitor with cookies of its own. Page errors and failed loads of our own address fail the test that asks for them.
 * @returns the context, its first page, and what went wrong on its pages so far
 */
export async function visitor(
  options: BrowserContextOptions = {},
): Promise<{ context: BrowserContext; page: Page; problems: string[] }> {
  const context = await (
    await browser()
  ).newContext({
    baseURL: inject('product').baseUrl,
    viewport: { width: 1440, height: 900 },
    acceptDownloads: true,
    // Contrast is judged on what stands, not on a colour on its way to another.
    reducedMotion: 'reduce',
    ...options,
  });
  const problems: string[] = [];
  context.on('weberror', (error) => problems.push(`page error: ${error.error().message}`));
  context.on('console', (message) => {
    if (message.type() === 'error') problems.push(`console: ${message.text()}`);
  });
  return { context, page: await context.newPage(), problems };
}

/** Saves a picture of a page under tests/.out/screens, for people to look at. */
export async function screenshot(page: Page, name: string): Promise<string> {
  const file = path.join(outFolder, 'screens', `${name}.png`);
  mkdirSync(path.dirname(file), { recursive: true });
  await page.screenshot({ path: file, fullPage: false });
  return file;
}
