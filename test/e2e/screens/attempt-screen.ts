import {type Locator, type Page} from '@playwright/test';

/** An exercise while it is run. */
export class AttemptScreen {
  readonly marks: Locator;
  readonly savedText: Locator;

  constructor(private readonly page: Page) {
    this.marks = page.getByRole('heading', {name: 'Marks so far'});
    this.savedText = page.getByText(/Everything is saved|not sent yet/).first();
  }

  /** From the library to a new attempt. */
  async startExercise(title: string): Promise<void> {
    await this.page.goto('/exercises');
    await this.page.getByRole('link', {name: title}).click();
    await this.page.getByRole('button', {name: 'Start the attempt'}).click();
    await this.page.waitForURL(/\/attempts\/[0-9a-f-]{36}$/);
    await this.marks.waitFor();
  }

  get attemptId(): string {
    return /attempts\/([0-9a-f-]{36})/.exec(this.page.url())?.[1] ?? '';
  }

  async startLine(): Promise<void> {
    await this.page.getByRole('button', {name: /Start the line|Change speed/}).click();
  }

  async stopLine(): Promise<void> {
    await this.page.getByRole('button', {name: 'Stop', exact: true}).click();
  }

  async runAt(factor: 1 | 2 | 5 | 20): Promise<void> {
    await this.page.getByRole('radio', {name: `×${factor}`}).click();
  }

  async set(label: string, text: string): Promise<void> {
    const field = this.page.getByRole('textbox', {name: label, exact: true});
    await field.fill(text);
    await field.press('Enter');
  }

  async more(label: string): Promise<void> {
    await this.page.getByRole('button', {name: `More: ${label}`}).click();
  }

  async less(label: string): Promise<void> {
    await this.page.getByRole('button', {name: `Less: ${label}`}).click();
  }

  /** Simulated seconds left, as the screen says. */
  async leftS(): Promise<number> {
    const text = (await this.page.getByText(/time left/).textContent()) ?? '';
    const [, minutes = '0', seconds = '0'] = /(\d+):(\d\d)/.exec(text) ?? [];
    return 60 * Number(minutes) + Number(seconds);
  }

  /** Waits until the simulation has come this far [s]. */
  async waitUntil(seconds: number, limitS: number): Promise<void> {
    const deadline = Date.now() + 60_000;
    while (limitS - (await this.leftS()) < seconds) {
      if (Date.now() > deadline) throw new Error(`the run never reached ${seconds} s`);
      await this.page.waitForTimeout(50);
    }
  }

  async handIn(): Promise<void> {
    await this.page.getByRole('button', {name: 'Hand in', exact: true}).click();
    await this.page.getByRole('button', {name: 'Yes, hand in'}).click();
  }
}
