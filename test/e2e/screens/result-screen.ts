import {type Locator, type Page} from '@playwright/test';

/** What came of an attempt. */
export class ResultScreen {
  readonly verdict: Locator;
  readonly heading: Locator;

  constructor(private readonly page: Page) {
    this.verdict = page.getByRole('status').filter({hasText: /passed|not yet/});
    this.heading = page.getByRole('heading', {level: 1});
  }

  /** Waits until the server has scored it. */
  async waitForScore(): Promise<void> {
    await this.page.waitForURL(/\/result$/, {timeout: 30_000});
    await this.verdict.waitFor({timeout: 30_000});
  }
}
