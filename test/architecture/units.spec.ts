import ts from 'typescript';
import {filesBelow, parse, walk} from './files';

/** Ends of names that are a unit: widthM, tiS, maxTorqueNm, rollRadps. */
const UNIT =
  /(?<=[a-z0-9])(M|M2|M3|S|N|Pa|Nm|NmS|Nps|NPerM|NsPerM|Kg|KgM2|KgM3|Mps|Mps2|Rad|Radps|Pct|C|K|JPerK|WPerK|PerK|Hz|J|W)$/;
/** Numbers without a dimension, by what they are. */
const DIMENSIONLESS =
  /(Gain|Fraction|Weight|Share|Factor)$|^(breakaway|derivativeN|supply|seed|inputSign)$/;

/** Numbers of the exported parameter interfaces (`…Params`, settings, disturbances) without unit in name or comment. */
function numbersWithoutUnit(file: string, text?: string): string[] {
  const source = parse(file, text);
  const found: string[] = [];
  walk(source, (node) => {
    if (!ts.isInterfaceDeclaration(node) || !/(Params|Settings|Disturbance)$/.test(node.name.text))
      return;
    for (const member of node.members) {
      if (!ts.isPropertySignature(member) || !/\bnumber\b/.test(member.type?.getText(source) ?? ''))
        continue;
      const name = member.name.getText(source);
      const comment = member.getFullText(source).slice(0, -member.getText(source).length);
      const hasUnit = UNIT.test(name) || /\[[^\]]+\]/.test(comment) || DIMENSIONLESS.test(name);
      if (!hasUnit) found.push(`${file}: ${node.name.text}.${name}`);
    }
  });
  return found;
}

describe('numbers of the parameter interfaces in sim-core', () => {
  it('have a unit in their name or comment', () => {
    const files = filesBelow(['sim-core']).filter((file) => /(?<!\.spec)\.ts$/.test(file));

    // kp is % of output per % of range wherever it stands; its comment is at LiveSettings.
    const missing = files
      .flatMap((file) => numbersWithoutUnit(file))
      .filter((each) => !each.endsWith('.kp'));

    expect(missing).toEqual([]);
  });

  it('are missed when one has none', () => {
    const text =
      'export interface BrakeParams {\n  /** Torque. */\n  readonly torque: number;\n  readonly lagS: number;\n}';

    expect(numbersWithoutUnit('sim-core/x.ts', text)).toEqual([
      'sim-core/x.ts: BrakeParams.torque',
    ]);
  });
});
