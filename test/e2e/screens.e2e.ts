import AxeBuilder from '@axe-core/playwright';
import {expect, type Page} from '@playwright/test';
import {AttemptScreen} from './screens/attempt-screen';
import {SignInScreen} from './screens/sign-in-screen';
import {test} from './support/world';

const WIDTHS_PX = [360, 1024, 1440];
/** WCAG 2.2 AA. */
const RULES = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** No violation of the rules, and nothing wider than the window. */
async function expectFit(page: Page, name: string): Promise<void> {
  for (const width of WIDTHS_PX) {
    await page.setViewportSize({width, height: 900});
    await page.waitForTimeout(250); // the layout follows the width by observers
    const tooWide = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(tooWide, `${name} at ${width} px scrolls sideways by`).toBeLessThanOrEqual(0);
  }
  const {violations} = await new AxeBuilder({page}).withTags(RULES).analyze();
  expect(
    violations.map(({id, nodes}) => `${name}: ${id} ${nodes.map(({html}) => html).join(' | ')}`),
  ).toEqual([]);
}

for (const theme of ['light', 'dark'] as const) {
  test.describe(`in ${theme}, every screen`, () => {
    test.use({colorScheme: theme});

    test('can be read by all and fits from 360 px up', async ({page, world}) => {
      test.slow();
      const firm = await world.organisation();
      await page.goto('/sign-in');
      await page.getByLabel('E-mail').waitFor();
      await expectFit(page, 'sign-in');

      await new SignInScreen(page).signIn(await firm.person('instructor'));
      await page.getByRole('heading', {name: 'Today'}).waitFor();
      await page.getByText('Newest attempts').waitFor();
      await expectFit(page, 'today');
      await page.goto('/bench?seed=1&ticks=1500');
      await page.getByText('15.0 s').first().waitFor();
      await page.getByRole('button', {name: 'More settings'}).click();
      await expectFit(page, 'bench');
      await page.goto('/exercises');
      await page.getByRole('link', {name: 'Stop without a loop'}).waitFor();
      await expectFit(page, 'exercises');
      await page.setViewportSize({width: 1440, height: 900});
      await page.getByRole('link', {name: 'Stop without a loop'}).click();
      await page.getByRole('button', {name: 'Start the attempt'}).waitFor();
      await expectFit(page, 'exercise');
      await page.setViewportSize({width: 1440, height: 900});
      const attempt = new AttemptScreen(page);
      await attempt.startExercise('Stop without a loop');
      await expectFit(page, 'attempt');
      await page.goto(`${page.url()}/result`);
      await page.getByText('not handed in yet').waitFor();
      await expectFit(page, 'result');
      await page.goto('/attempts');
      await page.getByRole('row', {name: /Sample instructor/}).waitFor();
      await expectFit(page, 'attempts');
      await page.goto('/account');
      await page.getByRole('button', {name: 'Sign out'}).waitFor();
      await expectFit(page, 'account');
    });
  });
}
