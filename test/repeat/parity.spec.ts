import {Scenario} from '#shared/scenario/scenario';
import {randomDocument} from './support/documents';
import {type Edge, edges} from './support/edges';
import {disagreement} from './support/parity';

const DOCUMENTS = 10_000;
/** Differences that are told of; the others are most often the same again. */
const TOLD = 10;

/** What the two say of documents they do not agree about, the first of them. */
function differences(documents: Iterable<Edge>): string[] {
  const found: string[] = [];
  for (const {what, document} of documents) {
    const verdicts = disagreement(document);
    if (verdicts === undefined) continue;
    found.push(`${what}: the engine ${verdicts.engine}; the schema ${verdicts.schema}`);
    if (found.length === TOLD) break;
  }
  return found;
}

function* randomDocuments(): Generator<Edge> {
  for (let seed = 0; seed < DOCUMENTS; seed++)
    yield {what: `randomDocument(${seed})`, document: randomDocument(seed)};
}

describe('engine and schema of the wire', () => {
  it('accept and refuse the same values in every key, at its ends and beyond', () => {
    expect(differences(edges())).toEqual([]);
  });

  it(`accept and refuse the same of ${DOCUMENTS} random documents`, () => {
    expect(differences(randomDocuments())).toEqual([]);
  });

  it('are asked about both kinds in plenty', () => {
    const all = edges();
    const taken = all.filter(({document}) => Scenario.safeParse(document).success).length;

    expect(all.length).toBeGreaterThan(5000);
    expect(taken).toBeGreaterThan(0.1 * all.length);
    expect(taken).toBeLessThan(0.9 * all.length);
  });
});
