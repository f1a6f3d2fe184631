import { afterAll, afterEach, beforeAll, expect, inject } from 'vitest';
import { Site } from './site.ts';

/**
 * The site for the tests of one file. Whatever goes wrong unseen in the browser fails the test that brought it about.
 * @returns a function, since there is no site before the tests begin
 */
export function useSite(options: { empty?: boolean } = {}): () => Site {
  let site: Site | undefined;
  const running = () => {
    if (!site) throw new Error('The site has not started.');
    return site;
  };
  beforeAll(async () => {
    site = await Site.start(options.empty ? null : inject('template'));
  });
  afterEach(() => {
    expect(running().faults.take()).toEqual([]);
  });
  afterAll(() => site?.close());
  return running;
}
