import * as a from '../reference/a-smooth-running.rows';
import * as b from '../reference/b-start-step-stop.rows';
import * as c from '../reference/c-out-of-round.rows';
import * as d from '../reference/d-dancer-speed-change.rows';
import * as e from '../reference/e-near-core-hot.rows';
import * as f from '../reference/f-web-break.rows';
import * as g from '../reference/g-rounded-ramps.rows';
import {live, LIVELY} from '../test-support/a-live-log';
import {ENGINE} from './engine';
import {BYTES} from './hashes';
import {startRun} from './replay';

const TICKS = 4000;

function hashOf(document: unknown): string {
  const run = startRun(document);
  run.advance(TICKS);
  return run.hash();
}

/**
 * Same document and seed, same bytes: here, in every browser and on the server. When a change of the engine
 * changes bytes on purpose, count ENGINE up and write the new hashes: stored results keep the number they
 * were made with.
 */
describe(`the bytes of engine ${ENGINE}`, () => {
  it('are listed for this number', () => {
    expect(BYTES.engine).toBe(ENGINE);
  });

  const documents = {a, b, c, d, e, f, g};
  for (const [name, {DOCUMENT}] of Object.entries(documents))
    it(`are those of reference case ${name}`, () => {
      expect(hashOf(DOCUMENT)).toBe(BYTES.hashes[name]!);
    });

  it('are those of a stand with noise', () => {
    expect(hashOf(LIVELY)).toBe(BYTES.hashes['noise']!);
  });

  it('are those of a live log', () => {
    expect(live().run.hash()).toBe(BYTES.hashes['live']!);
  });
});
