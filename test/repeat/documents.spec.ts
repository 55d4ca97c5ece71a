import {ScenarioError, settingsOf, startRun, TRACE_COLUMNS, TraceBlock} from '#sim-core/index';
import {type Run, type Scenario} from '#sim-core/index';
import {randomDocument} from './support/documents';

const DOCUMENTS = 10_000;
/** How long each accepted one runs [s], and the most ticks that takes. */
const LENGTH_S = 2;
const MOST_TICKS = 2000;

/** What came of one document: how its run stands, or that it was refused, or what went wrong. */
type Fate = 'refused' | 'ran through' | 'ended before' | {readonly wrong: string};

describe(`${DOCUMENTS} random documents`, () => {
  const block = new TraceBlock(MOST_TICKS);
  const fates = new Map<number, Fate>();

  beforeAll(() => {
    for (let seed = 0; seed < DOCUMENTS; seed++) fates.set(seed, fateOf(seed));
    const count = (fate: Fate): number => [...fates.values()].filter((one) => one === fate).length;
    const [through, before, refused] = [
      count('ran through'),
      count('ended before'),
      count('refused'),
    ];
    console.log(
      `random documents: ${through} accepted and run for ${LENGTH_S} s, ${before} ended before, ${refused} refused`,
    );
  });

  function fateOf(seed: number): Fate {
    const document = randomDocument(seed);
    let run: Run;
    try {
      run = startRun(document);
    } catch (error) {
      if (error instanceof ScenarioError) return error.faults.length > 0 ? 'refused' : NO_FAULT;
      return {wrong: `startRun threw ${String(error)}`};
    }
    const {sampleS} = settingsOf((document as Scenario).controller);
    const ticks = Math.ceil(LENGTH_S / sampleS - 1e-9);
    try {
      const start = notFinite(run);
      block.count = 0;
      const ran = run.advance(ticks, block);
      const wrong = start ?? notFinite(run) ?? notFiniteRow(block);
      if (wrong !== undefined) return {wrong};
      if (run.outcome.kind === 'diverged') return {wrong: `diverged at tick ${run.outcome.atTick}`};
      return ran === ticks && run.outcome.kind === 'running' ? 'ran through' : 'ended before';
    } catch (error) {
      return {wrong: `the run threw ${String(error)}`};
    }
  }

  it('are refused with a ScenarioError or run with finite numbers in every row and view', () => {
    const wrong = [...fates].flatMap(([seed, fate]) =>
      typeof fate === 'string' ? [] : [`document ${seed}: ${fate.wrong}`],
    );

    expect(wrong).toEqual([]);
  });

  it(`are accepted and run for ${LENGTH_S} s by more than half`, () => {
    const through = [...fates.values()].filter((fate) => fate === 'ran through').length;

    expect(through).toBeGreaterThan(DOCUMENTS / 2);
    expect([...fates.values()].filter((fate) => fate === 'refused').length).toBeGreaterThan(1000);
  });
});

const NO_FAULT: Fate = {wrong: 'refused without a fault'};

/** The first number of the view that is none. */
function notFinite(run: Run): string | undefined {
  const found = Object.entries(run.view()).find(
    ([, value]) => typeof value === 'number' && !Number.isFinite(value),
  );
  return found && `view.${found[0]} is ${found[1]} after ${run.tick} ticks`;
}

/** The first number of the rows that is none. */
function notFiniteRow({rows, count}: TraceBlock): string | undefined {
  const width = TRACE_COLUMNS.length;
  for (let place = 0; place < count * width; place++)
    if (!Number.isFinite(rows[place]))
      return `${TRACE_COLUMNS[place % width]} is ${rows[place]} in row ${Math.floor(place / width)}`;
  return undefined;
}
