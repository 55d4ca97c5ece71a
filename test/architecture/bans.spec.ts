import {ESLint} from 'eslint';
import tseslint from 'typescript-eslint';
import {ROOT} from './files';

/** The project's own linter without what needs types: the texts below are of files that do not exist. */
const eslint = new ESLint({
  cwd: ROOT,
  overrideConfig: [
    {files: ['**/*.ts'], ...tseslint.configs.disableTypeChecked},
    {rules: {'import-x/no-cycle': 'off'}},
  ],
});

async function rulesBrokenBy(filePath: string, text: string): Promise<string[]> {
  const [result] = await eslint.lintText(text, {filePath});
  return (result?.messages ?? []).map(({ruleId, message}) => ruleId ?? message);
}

const SYNTAX = 'no-restricted-syntax';
const GLOBALS = 'no-restricted-globals';
const IMPORTS = '@typescript-eslint/no-restricted-imports';
const PROPERTIES = 'no-restricted-properties';

const ENGINE = 'sim-core/plant/seeded.ts';
const seeded: readonly (readonly [file: string, text: string, rule: string])[] = [
  ...['sin', 'cos', 'exp', 'log', 'pow', 'hypot', 'atan2', 'cbrt', 'random', 'trunc', 'PI'].map(
    (name) => [ENGINE, `export const x = Math.${name};`, SYNTAX] as const,
  ),
  [ENGINE, "export const x = Math['sin'](1);", SYNTAX],
  [ENGINE, 'const {sin} = Math; export const x = sin(1);', SYNTAX],
  [ENGINE, 'export const x = (y: number) => y ** 2;', SYNTAX],
  [ENGINE, 'export function f(y: number) { y **= 2; return y; }', SYNTAX],
  [ENGINE, 'export async function f() { await g(); } declare function g(): Promise<void>;', SYNTAX],
  [ENGINE, 'export const x = new Date();', GLOBALS],
  [ENGINE, 'export const x = performance.now();', GLOBALS],
  [ENGINE, 'export const x = globalThis;', GLOBALS],
  [ENGINE, "import * as z from 'zod'; export const x = z;", IMPORTS],
  [ENGINE, "import {pid} from '../control/pid'; export const x = pid;", IMPORTS],
  [
    'sim-core/control/seeded.ts',
    "import {roll} from '../plant/roll'; export const x = roll;",
    IMPORTS,
  ],
  [
    'sim-core/run/seeded.ts',
    "import {Run} from '#shared/runs/run'; export const x = Run;",
    IMPORTS,
  ],
  ['sim-core/run/seeded.ts', 'export enum Phase { start }', SYNTAX],
  ['shared/runs/seeded.ts', 'export enum Phase { start }', SYNTAX],
  ['shared/runs/seeded.ts', "import express from 'express'; export const x = express;", IMPORTS],
  [
    'shared/runs/seeded.ts',
    "import {startRun} from '#sim-core/index'; export const x = startRun;",
    IMPORTS,
  ],
  ['server/seeded.ts', 'export enum Phase { start }', SYNTAX],
  ['server/features/x/x-routes.ts', "export const x = process.env['PORT'];", PROPERTIES],
  ['server/features/x/x-routes.ts', 'export const x = source.getRepository(X);', SYNTAX],
  ['server/seeded.ts', "import {X} from '../src/app/app'; export const x = X;", IMPORTS],
  ['server/seeded.ts', "import {X} from '#sim-core/run/run'; export const x = X;", IMPORTS],
  ['src/app/bench/seeded.ts', 'export enum Phase { start }', SYNTAX],
  [
    'src/app/bench/seeded.ts',
    "import {X} from '../../../server/app'; export const x = X;",
    IMPORTS,
  ],
  ['src/app/ui/seeded.ts', "import {X} from '../bench/bench-page'; export const x = X;", IMPORTS],
  ['test/support/seeded.ts', "import {X} from '../../server/main'; export const x = X;", IMPORTS],
  ['server/seeded.ts', 'const x = 1; export default x;', 'import-x/no-default-export'],
  ['server/features/x/x-routes.ts', "console.log('x');", 'no-console'],
  ['server/seeded.spec.ts', "fit('x', () => { expect(1).toBe(1); });", GLOBALS],
  ['server/seeded.spec.ts', "xdescribe('x', () => { expect(1).toBe(1); });", GLOBALS],
];

describe('the ban list of the linter', () => {
  for (const [file, text, rule] of seeded) {
    it(`refuses in ${file}: ${text}`, async () => {
      expect(await rulesBrokenBy(file, `${text}\n`)).toContain(rule);
    });
  }

  it('lets the exact functions through', async () => {
    const text =
      'export const f = (y: number) => Math.sqrt(Math.abs(Math.min(y, Math.floor(y))));\n';

    expect(await rulesBrokenBy(ENGINE, text)).toEqual([]);
  });

  it('lets config.ts alone read the environment and a service alone read rows', async () => {
    expect(
      await rulesBrokenBy('server/config.ts', "export const x = process.env['PORT'];\n"),
    ).toEqual([]);
    expect(
      await rulesBrokenBy(
        'server/features/x/x-service.ts',
        'export const f = (s: any) => s.getRepository(1);\n',
      ),
    ).not.toContain(SYNTAX);
  });
});
