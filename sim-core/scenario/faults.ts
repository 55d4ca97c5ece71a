/** One thing wrong in a document or an act. */
export interface Fault {
  /** Where: `web.widthM`, `line[2].rampS`. Empty for the document itself. */
  readonly path: string;
  /** What stands there; undefined when the key is missing. */
  readonly value: unknown;
  /** What may stand there, for people: `0.001 … 20 m`. */
  readonly allowed: string;
}

/** Wrong input, refused at the door with everything that is wrong in it. */
export class ScenarioError extends Error {
  constructor(readonly faults: readonly Fault[]) {
    super(faults.map(describeFault).join('; '));
    this.name = 'ScenarioError';
  }
}

/** Longest piece of a wrong value that is repeated in a message. */
const LONGEST_QUOTE = 60;

function describeFault({path, value, allowed}: Fault): string {
  return `${path === '' ? 'document' : path}: ${quote(value)}, allowed: ${allowed}`;
}

function quote(value: unknown): string {
  if (value === undefined) return 'missing';
  if (typeof value === 'number' || typeof value === 'boolean') return `${value}`;
  if (typeof value === 'string') return `"${shorten(value)}"`;
  if (value === null) return 'null';
  return Array.isArray(value) ? `a list of ${value.length}` : `a ${typeof value}`;
}

function shorten(text: string): string {
  return text.length > LONGEST_QUOTE ? `${text.slice(0, LONGEST_QUOTE)}…` : text;
}
