import {type BrowserContext, expect} from '@playwright/test';

/** What a page did that it must never do. */
export interface Misdeeds {
  readonly list: string[];
  /** Lets console errors through that the test causes on purpose (a refused call, a dead server). */
  allow(pattern: RegExp): void;
}

/** Watches every page of a context for requests to other hosts, console errors and uncaught errors. */
export function watch(context: BrowserContext, origin: string): Misdeeds {
  const list: string[] = [];
  const allowed: RegExp[] = [];
  const report = (misdeed: string): void => {
    if (!allowed.some((pattern) => pattern.test(misdeed))) list.push(misdeed);
  };

  context.on('request', (request) => {
    const url = new URL(request.url());
    const isLocal = url.origin === origin || url.protocol === 'data:' || url.protocol === 'blob:';
    if (!isLocal) list.push(`request to another host: ${request.url()}`);
  });
  context.on('console', (message) => {
    if (message.type() === 'error')
      report(`console error: ${message.text()} ${message.location().url}`);
  });
  context.on('weberror', (error) => report(`uncaught: ${error.error().message}`));

  return {list, allow: (pattern) => allowed.push(pattern)};
}

/** Fails the test when its pages misbehaved. */
export function expectNoMisdeeds(misdeeds: Misdeeds): void {
  expect(misdeeds.list, 'requests to other hosts and console errors').toEqual([]);
}
