import {type Page} from '@playwright/test';
import {PASSWORD} from '../support/world';

/** The door. */
export class SignInScreen {
  constructor(private readonly page: Page) {}

  /** Opens a page of the app and signs in on the way. */
  async signIn(email: string, path = '/today', password = PASSWORD): Promise<void> {
    await this.page.goto(path);
    await this.page.getByLabel('E-mail').fill(email);
    await this.page.getByLabel('Password').fill(password);
    await this.page.getByRole('button', {name: 'Sign in'}).click();
  }
}
