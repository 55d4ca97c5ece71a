import {type Logger} from 'pino';
import {type DataSource} from 'typeorm';

/** What a demo step may use; it works through the services. */
export interface DemoParts {
  readonly db: DataSource;
  readonly log: Logger;
  readonly now: () => Date;
}

/** What one feature adds to the demo. Running it again adds nothing. */
export interface DemoStep {
  readonly name: string;
  /** Steps that must have run before. */
  readonly after?: readonly DemoStep[];
  readonly run: (parts: DemoParts) => Promise<void>;
}

/** Runs every step once, each after those it names. */
export async function runDemo(steps: readonly DemoStep[], parts: DemoParts): Promise<void> {
  const done = new Set<DemoStep>();
  const runOnce = async (step: DemoStep): Promise<void> => {
    if (done.has(step)) return;
    done.add(step);
    for (const before of step.after ?? []) await runOnce(before);
    await step.run(parts);
    parts.log.info({step: step.name}, 'demo');
  };
  for (const step of steps) await runOnce(step);
}
