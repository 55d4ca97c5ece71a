import {expect, type Page} from '@playwright/test';
import {type LogEntry, startRun} from '#sim-core/index';
import {AttemptScreen} from './screens/attempt-screen';
import {ResultScreen} from './screens/result-screen';
import {SignInScreen} from './screens/sign-in-screen';
import {
  endProgram,
  freePort,
  type Program,
  programEnvironment,
  startProgram,
  waitUntilReady,
} from './support/programs';
import {watch} from './support/quiet-page';
import {type StoredAttempt, test, type World} from './support/world';

const TITLE = 'Stop without a loop';
const LIMIT_S = 300;
const CHANGES = 30;

/** Hash of the same acts on an undisturbed run: the engine driven live, act by act, from the same document. */
async function undisturbedHash(world: World, stored: StoredAttempt): Promise<string> {
  const run = startRun(await world.scenarioOf(stored));
  for (const entry of stored.entries) {
    run.advance(entry.tick - run.tick);
    const again = give(run, entry);
    if (again !== null) expect(again).toEqual(entry);
  }
  return run.hash();
}

function give(run: ReturnType<typeof startRun>, entry: LogEntry): LogEntry | null {
  switch (entry.kind) {
    case 'set':
      return run.act({set: entry.set});
    case 'line':
      return run.act({line: entry.line});
    case 'factor':
      return run.note({kind: 'factor', factor: entry.factor});
    case 'pause':
    case 'resume':
      return run.note({kind: entry.kind});
    case 'end':
      return null; // written after the hash was taken
    default:
      throw new Error(`no act of this test is a ${entry.kind}`);
  }
}

function gainChanges(entries: readonly LogEntry[]): number {
  return entries.filter((entry) => entry.kind === 'set' && 'kp' in entry.set).length;
}

/** Changes the gain up and down, so that it stays in its range. */
async function changeGain(attempt: AttemptScreen, times: number): Promise<void> {
  for (let change = 0; change < times; change++) {
    if (change % 2 === 0) await attempt.more('Gain');
    else await attempt.less('Gain');
  }
}

async function expectWhole(world: World, attemptId: string): Promise<void> {
  const stored = await world.attempt(attemptId);
  const end = stored.entries.at(-1);
  expect(stored.entries.map(({n}) => n)).toEqual(stored.entries.map((_, place) => place + 1));
  expect(gainChanges(stored.entries)).toBe(CHANGES);
  expect(end?.kind === 'end' && end.hash).toBe(stored.hash);
  expect(stored.hashAgrees).toBe(true);
  expect(await undisturbedHash(world, stored)).toBe(stored.hash);
}

async function handInAndWait(page: Page, attempt: AttemptScreen): Promise<void> {
  await attempt.handIn();
  await new ResultScreen(page).waitForScore();
}

test.describe('what was run is never lost', () => {
  test.describe('without a connection', () => {
    test.use({serviceWorkers: 'allow'});

    test('an attempt goes on, survives a closed tab, and arrives whole', async ({
      context,
      page,
      world,
      misdeeds,
    }) => {
      misdeeds.allow(/ERR_INTERNET_DISCONNECTED|Failed to load resource/);
      const firm = await world.organisation();
      const attempt = new AttemptScreen(page);
      await new SignInScreen(page).signIn(await firm.person('trainee'), '/exercises');
      await page.getByRole('heading', {name: 'Exercises'}).waitFor();
      await page.evaluate(() => navigator.serviceWorker.ready);
      await attempt.startExercise(TITLE);
      const {attemptId} = attempt;
      await attempt.startLine();
      await attempt.waitUntil(2, LIMIT_S);
      await expect(attempt.savedText).toContainText('Everything is saved');

      await context.setOffline(true);
      const offlineFromS = LIMIT_S - (await attempt.leftS());
      await changeGain(attempt, CHANGES);
      await attempt.runAt(5);
      await attempt.waitUntil(offlineFromS + 26, LIMIT_S);
      await expect(attempt.savedText).toContainText('not sent yet');
      const kept = (await world.attempt(attemptId)).entries;
      expect(gainChanges(kept)).toBe(0);
      const address = page.url();
      await page.close();

      const later = await context.newPage();
      const again = new AttemptScreen(later);
      await later.goto(address);
      await expect(later.getByText('Your attempt is as you left it.')).toBeVisible();
      expect(LIMIT_S - (await again.leftS())).toBeGreaterThanOrEqual(offlineFromS + 20);
      await context.setOffline(false);
      await expect(again.savedText).toContainText('Everything is saved');
      await later.getByRole('button', {name: 'Continue'}).click();
      await handInAndWait(later, again);

      await expectWhole(world, attemptId);
    });
  });

  test('a server killed between two batches gets the rest when it is back', async ({
    browser,
    world,
  }) => {
    const port = await freePort();
    const url = `http://127.0.0.1:${port}`;
    const start = async (): Promise<Program> => {
      const program = startProgram(
        'main',
        programEnvironment(process.env['E2E_DATABASE_URL'] ?? '', port),
      );
      await waitUntilReady(url, program);
      return program;
    };
    let server = await start();
    const context = await browser.newContext({baseURL: url});
    const misdeeds = watch(context, url);
    misdeeds.allow(/ERR_CONNECTION_REFUSED|ERR_CONNECTION_RESET|Failed to load resource/);
    try {
      const page = await context.newPage();
      const attempt = new AttemptScreen(page);
      const firm = await world.organisation();
      await new SignInScreen(page).signIn(await firm.person('trainee'), '/exercises');
      await page.getByRole('heading', {name: 'Exercises'}).waitFor();
      await attempt.startExercise(TITLE);
      await attempt.startLine();
      await changeGain(attempt, CHANGES / 2);
      await expect(attempt.savedText).toContainText('Everything is saved');

      await endProgram(server, 'SIGKILL');
      await changeGain(attempt, CHANGES / 2);
      await expect(attempt.savedText).toContainText('not sent yet');
      server = await start();
      await expect(attempt.savedText).toContainText('Everything is saved', {timeout: 45_000});
      await handInAndWait(page, attempt);

      await expectWhole(world, attempt.attemptId);
      expect(misdeeds.list).toEqual([]);
    } finally {
      await context.close();
      await endProgram(server, 'SIGTERM');
    }
  });
});
