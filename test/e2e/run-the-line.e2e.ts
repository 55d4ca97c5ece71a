import {expect} from '@playwright/test';
import {SignInScreen} from './screens/sign-in-screen';
import {test} from './support/world';

test.describe('the Bench', () => {
  test('breaks the web when the gain is far too high, and threads it again with the same settings', async ({
    page,
    world,
  }) => {
    const firm = await world.organisation();
    await new SignInScreen(page).signIn(await firm.person('trainee'), '/bench?seed=3');
    await page.getByRole('button', {name: 'Small roll'}).click();
    const gain = page.getByRole('textbox', {name: 'Gain', exact: true});
    await gain.fill('5');
    await gain.press('Enter');
    await page.getByRole('button', {name: 'Start the line'}).click();

    const told = page.getByRole('alert').filter({hasText: 'The web broke at'});
    await expect(told).toContainText(/limit 1200 N/);
    await page.keyboard.press('t');
    await expect(told).toHaveCount(0);
    await expect(gain).toHaveValue('5');
    await expect(page.getByRole('button', {name: 'Start the line'})).toBeEnabled();
  });

  test('goes on after a reload where it was', async ({page, world}) => {
    const firm = await world.organisation();
    await new SignInScreen(page).signIn(await firm.person('trainee'), '/bench');
    await page.getByRole('button', {name: 'Start the line'}).click();
    const integral = page.getByRole('textbox', {name: 'Integral time', exact: true});
    await integral.fill('0,8');
    await integral.press('Enter');
    await expect(integral).toHaveValue('0.8');

    await page.reload();

    await expect(integral).toHaveValue('0.8');
    await expect(page.getByRole('button', {name: 'Change speed'})).toBeVisible();
  });

  test('refuses what is no number or out of range, and keeps what was typed', async ({
    page,
    world,
  }) => {
    const firm = await world.organisation();
    await new SignInScreen(page).signIn(await firm.person('technician'), '/bench');
    const gain = page.getByRole('textbox', {name: 'Gain', exact: true});

    await gain.fill('much');
    await gain.press('Enter');
    await expect(page.getByText('“much” is not a number.')).toBeVisible();
    await gain.fill('90');
    await gain.press('Enter');
    await expect(page.getByText(/Allowed: 0.01 to 5/)).toBeVisible();
    await expect(gain).toHaveValue('90');
  });
});
