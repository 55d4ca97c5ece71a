// How many tests passed and failed, read from what each runner leaves behind. Skipped is failed: nothing is skipped.

/** The sum over parts. */
export function addUp(counts) {
  return counts.reduce(
    (sum, {passed, failed}) => ({passed: sum.passed + passed, failed: sum.failed + failed}),
    {passed: 0, failed: 0},
  );
}

export function describeCounts({passed, failed}) {
  return `${passed} passed, ${failed} failed`;
}

/** A runner that ended badly without naming a failed test (a crash, a file that does not load) failed once. */
export function withExitCode(counts, code) {
  return code !== 0 && counts.failed === 0 ? {...counts, failed: 1} : counts;
}

/** From Karma's last progress line, `Executed 7 of 9 (1 FAILED) (skipped 1)`; a test that did not run failed. */
export function countKarma(output) {
  const lines = [...output.matchAll(/Executed (\d+) of (\d+)([^\n\r]*)/g)];
  const last = lines.at(-1);
  if (!last) return {passed: 0, failed: 0};
  const [, executed, planned, rest = ''] = last;
  const failed = Number(/\((\d+) FAILED\)/.exec(rest)?.[1] ?? 0);
  // Karma counts skipped ones neither as executed nor as failed.
  return {passed: Number(executed) - failed, failed: failed + Number(planned) - Number(executed)};
}

/** From the statistics of Playwright's JSON report; a flaky test is one that failed. */
export function countPlaywright({stats, errors = []}) {
  const failed = stats.unexpected + stats.flaky + stats.skipped;
  return {passed: stats.expected, failed: failed > 0 ? failed : Math.min(errors.length, 1)};
}
