import {isDeepStrictEqual} from 'node:util';
import {scenarioFaults} from '#sim-core/index';
import {Scenario} from '#shared/scenario/scenario';

/** What the engine and the schema of the wire say about one document. */
export interface Verdicts {
  readonly engine: string;
  readonly schema: string;
}

const TAKEN = 'taken';

/**
 * Where the two do not agree about a document; undefined where they do. How stiff a plant is only the engine can
 * work out, so a document that it refuses for nothing else counts as taken.
 */
export function disagreement(document: unknown): Verdicts | undefined {
  const parsed = Scenario.safeParse(document);
  const faults = scenarioFaults(document).filter(
    ({allowed}) => !allowed.startsWith('a plant slower than'),
  );
  if (parsed.success === (faults.length === 0)) {
    // what the schema gives back must be what it was given, or the server would store another document
    if (!parsed.success || isDeepStrictEqual(parsed.data, document)) return undefined;
    return {engine: TAKEN, schema: 'gives back another document'};
  }
  const engine = faults.map(({path, allowed}) => `refuses ${path} (allowed: ${allowed})`);
  const schema = parsed.error?.issues.map(
    ({path, message}) => `refuses ${path.join('.')} (${message})`,
  );
  return {engine: engine.slice(0, 3).join('; ') || TAKEN, schema: schema?.join('; ') ?? TAKEN};
}
