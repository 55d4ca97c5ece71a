import {
  commandsOf,
  type LogEntry,
  type Score,
  scoreRun,
  settingsOf,
  type TraceRows,
} from '#sim-core/index';
import {type ExerciseToRun} from '#shared/exercises/exercise';

/**
 * Marks so far, from what the controller measured: the true tension stays hidden until the attempt is handed in.
 * Only shown; the score comes from the server's replay.
 */
export function interimScore(
  exercise: ExerciseToRun,
  rows: TraceRows,
  entries: readonly LogEntry[],
  endedEarly: boolean,
): Score {
  const measured: TraceRows = {
    count: rows.count,
    at: (row, column) => {
      if (column === 'slackM') return 0; // no sensor sees a loop
      return rows.at(row, column === 'tensionN' ? 'measuredN' : column);
    },
  };
  const {sampleS} = settingsOf(exercise.scenario.controller);
  return scoreRun(exercise, {
    rows: measured,
    commands: commandsOf(exercise.scenario, entries, sampleS),
    sampleS,
    endedEarly,
  });
}
