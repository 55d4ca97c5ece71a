/* global describe, it, expect */
import {addUp, countKarma, countPlaywright, describeCounts, withExitCode} from './counts.mjs';

describe('the counts of npm test', () => {
  it('add up over parts', () => {
    const sum = addUp([
      {passed: 3, failed: 0},
      {passed: 4, failed: 2},
    ]);

    expect(describeCounts(sum)).toBe('7 passed, 2 failed');
  });

  it('fail once when a runner ends badly without a failed test', () => {
    expect(withExitCode({passed: 5, failed: 0}, 1)).toEqual({passed: 5, failed: 1});
    expect(withExitCode({passed: 5, failed: 2}, 1)).toEqual({passed: 5, failed: 2});
    expect(withExitCode({passed: 5, failed: 0}, 0)).toEqual({passed: 5, failed: 0});
  });

  describe('of Karma', () => {
    it('come from the last progress line', () => {
      const output =
        'Chrome: Executed 1 of 9 SUCCESS (0 secs)\r\nChrome: Executed 9 of 9 (2 FAILED) (1.2 secs / 1 secs)\nTOTAL: 2 FAILED, 7 SUCCESS\n';

      expect(countKarma(output)).toEqual({passed: 7, failed: 2});
    });

    it('take skipped specs and specs never reached as failed', () => {
      expect(countKarma('Executed 7 of 9 (skipped 2) SUCCESS')).toEqual({passed: 7, failed: 2});
      expect(countKarma('Executed 4 of 9 DISCONNECTED (10 secs)')).toEqual({passed: 4, failed: 5});
    });

    it('are nothing when nothing ran', () => {
      expect(countKarma('Error: no inputs')).toEqual({passed: 0, failed: 0});
    });
  });

  describe('of Playwright', () => {
    it('take flaky and skipped tests as failed', () => {
      const stats = {expected: 6, unexpected: 1, flaky: 1, skipped: 1};

      expect(countPlaywright({stats})).toEqual({passed: 6, failed: 3});
    });

    it('fail once for an error outside the tests', () => {
      const stats = {expected: 0, unexpected: 0, flaky: 0, skipped: 0};

      expect(countPlaywright({stats, errors: [{message: 'no server'}]})).toEqual({
        passed: 0,
        failed: 1,
      });
    });
  });
});
