import ts from 'typescript';
import {parse, walk} from './files';

/** Where a feature plugs in by one line (DEVELOPERS.md, "The walk"), and what orders the lines. */
const LISTS: readonly (readonly [file: string, variable: string])[] = [
  ['server/db/migrations/list.ts', 'MIGRATIONS'],
  ['server/demo/list.ts', 'DEMO'],
  ['server/features.ts', 'FEATURES'],
  ['server/jobs.ts', 'JOBS'],
  ['shared/problem.ts', 'PROBLEM_STATUS'],
  ['src/app/app.routes.ts', 'routes'],
];

/** What the lines of a list are ordered by: a migration's time, a route's path, else the name. */
function keysOf(file: string, variable: string, text?: string): string[] {
  const source = parse(file, text);
  let list: ts.Expression | undefined;
  walk(source, (node) => {
    if (ts.isVariableDeclaration(node) && node.name.getText(source) === variable)
      list = node.initializer;
  });
  while (list !== undefined && (ts.isAsExpression(list) || ts.isSatisfiesExpression(list)))
    list = list.expression;
  if (list === undefined) throw new Error(`${file} has no ${variable}`);
  if (ts.isObjectLiteralExpression(list))
    return list.properties.map((each) => plain(each.name?.getText(source) ?? ''));
  if (ts.isArrayLiteralExpression(list))
    return linesOf(list, source).map((each) => keyOfLine(each, source));
  throw new Error(`${variable} of ${file} is no list`);
}

/** Routes of signed-in people are the children of one. */
function linesOf(list: ts.ArrayLiteralExpression, source: ts.SourceFile): ts.Expression[] {
  return list.elements.flatMap((line) => {
    const inner = propertyOf(line, 'children', source);
    return inner !== undefined && ts.isArrayLiteralExpression(inner)
      ? linesOf(inner, source)
      : [line];
  });
}

function propertyOf(
  line: ts.Expression,
  name: string,
  source: ts.SourceFile,
): ts.Expression | undefined {
  if (!ts.isObjectLiteralExpression(line)) return undefined;
  const property = line.properties.find((each) => each.name?.getText(source) === name);
  return property !== undefined && ts.isPropertyAssignment(property)
    ? property.initializer
    : undefined;
}

function keyOfLine(line: ts.Expression, source: ts.SourceFile): string {
  if (!ts.isObjectLiteralExpression(line))
    return /\d{13}/.exec(line.getText(source))?.[0] ?? line.getText(source);
  return plain(propertyOf(line, 'path', source)?.getText(source) ?? '');
}

function plain(text: string): string {
  return text.replaceAll(/['"]/g, '').toLowerCase();
}

/** The start page, the sign-in page and the catch-all have their own places. */
function isFeature(key: string): boolean {
  return !['', '**', 'sign-in'].includes(key);
}

describe('the list that features plug into', () => {
  for (const [file, variable] of LISTS) {
    it(`${file} is in order`, () => {
      const keys = keysOf(file, variable).filter(isFeature);

      expect(keys).toEqual([...keys].sort());
    });
  }

  it('src/app/navigation.ts names each place once, in the order of the screen', () => {
    const keys = keysOf('src/app/navigation.ts', 'NAVIGATION');

    expect(new Set(keys).size).toBe(keys.length);
    expect(keys.length).toBeGreaterThan(0);
  });

  it('is read by path, by name and by time', () => {
    const text =
      "export const A: readonly X[] = [{path: '', children: [{path: 'bench'}]}, {path: 'account'}, CreatePeople1764500000000, zFeature];";

    expect(keysOf('x.ts', 'A', text)).toEqual(['bench', 'account', '1764500000000', 'zFeature']);
  });
});
