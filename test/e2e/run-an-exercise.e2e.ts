import {expect} from '@playwright/test';
import {replay} from '#sim-core/index';
import {AttemptScreen} from './screens/attempt-screen';
import {ResultScreen} from './screens/result-screen';
import {SignInScreen} from './screens/sign-in-screen';
import {test, type World} from './support/world';

const TITLE = 'Stop without a loop';
const LIMIT_S = 300;

test.describe('an exercise, from sign-in to the score', () => {
  test('is run, scored from its log by the server, and seen by those who may', async ({
    page,
    world,
    browser,
    baseURL,
    misdeeds,
  }) => {
    const firm = await world.organisation();
    const trainee = await firm.person('trainee', 'Rosa Lind');
    const instructor = await firm.person('instructor');
    const stranger = await (await world.organisation('Another Firm')).person('trainee');
    const attempt = new AttemptScreen(page);
    const result = new ResultScreen(page);

    await new SignInScreen(page).signIn(trainee, '/exercises');
    await page.getByRole('heading', {name: 'Exercises'}).waitFor();
    await attempt.startExercise(TITLE);
    const {attemptId} = attempt;
    await attempt.startLine();
    await attempt.runAt(20);
    await attempt.set('Gain', '0,25');
    await attempt.set('Stop-hold boost', '1.4');
    await attempt.set('Boost time', '5');
    await attempt.waitUntil(20, LIMIT_S);
    await attempt.runAt(5); // at ×20 nobody can hit a window of eight seconds
    await attempt.stopLine();
    const stoppedS = LIMIT_S - (await attempt.leftS());
    await attempt.waitUntil(stoppedS + 14, LIMIT_S);
    await attempt.startLine();
    await attempt.waitUntil(stoppedS + 30, LIMIT_S);
    await attempt.handIn();
    await result.waitForScore();

    await expect(result.verdict).toContainText('passed');
    await expect(page.getByText('Loop at the stop: at most 5 mm')).toBeVisible();

    const stored = await world.attempt(attemptId);
    expect(stored.state).toBe('scored');
    expect(stored.entries.map(({n}) => n)).toEqual(stored.entries.map((_, place) => place + 1));
    await expectSameHashes(world, attemptId);

    const seen = await browser.newContext({baseURL: baseURL ?? ''});
    const desk = await seen.newPage();
    await new SignInScreen(desk).signIn(instructor, '/attempts');
    await expect(desk.getByRole('row', {name: /Rosa Lind.*Stop without a loop/})).toBeVisible();
    await seen.close();

    const hidden = await browser.newContext({baseURL: baseURL ?? ''});
    const outside = await hidden.newPage();
    misdeeds.allow(/404/);
    await new SignInScreen(outside).signIn(stranger, new URL(page.url()).pathname);
    await expect(outside.getByRole('heading', {name: 'Not found'})).toBeVisible();
    await expect(outside.getByText('Rosa Lind')).toHaveCount(0);
    await hidden.close();
  });
});

/** The browser's hash equals the server's, and moving one entry by one tick makes them differ. */
async function expectSameHashes(world: World, attemptId: string): Promise<void> {
  const stored = await world.attempt(attemptId);
  const {entries, hash, hashAgrees, throughTick} = stored;
  const end = entries.at(-1);
  expect(end?.kind).toBe('end');
  expect(end?.kind === 'end' && end.hash).toBe(hash);
  expect(hashAgrees).toBe(true);

  const scenario = await world.scenarioOf(stored);
  const line = entries.findIndex((entry) => entry.kind === 'line' && entry.line.command === 'stop');
  const movedStop = entries.map((entry, place) =>
    place === line ? {...entry, tick: entry.tick + 1} : entry,
  );
  expect(replay(scenario, entries, throughTick).hash()).toBe(hash);
  expect(replay(scenario, movedStop, throughTick).hash()).not.toBe(hash);
}
