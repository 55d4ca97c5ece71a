import path from 'node:path';
import ts from 'typescript';
import {parse, walk} from './files';

/** One import: who, what (a path in the project without its ending, or a package), and whether only types. */
export interface Import {
  readonly from: string;
  readonly to: string;
  readonly isPackage: boolean;
  readonly typesOnly: boolean;
}

const ENGINE_DOORS = ['sim-core/index', 'sim-core/analysis/index'];
const SHARED_VALUE_DOOR = 'sim-core/scenario/fields';
/** What lies in src/app beside the features and is there for all of them. */
const COMMON_ROOMS = ['live-run', 'platform', 'ui'];
/** Who is signed in: every feature may ask. */
const SESSION = 'src/app/session/session';

/** Static and dynamic imports and re-exports of a file. */
export function importsOf(file: string, text?: string): Import[] {
  const found: Import[] = [];
  const add = (specifier: ts.Node | undefined, typesOnly: boolean): void => {
    if (specifier !== undefined && ts.isStringLiteral(specifier)) {
      found.push({from: file, ...target(file, specifier.text), typesOnly});
    }
  };
  walk(parse(file, text), (node) => {
    if (ts.isImportDeclaration(node)) add(node.moduleSpecifier, importsTypesOnly(node));
    if (ts.isExportDeclaration(node)) add(node.moduleSpecifier, node.isTypeOnly);
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      add(node.arguments[0], false);
    }
  });
  return found;
}

/** Why an import breaks the table of DEVELOPERS.md, or undefined when it does not. */
export function objection(each: Import): string | undefined {
  const {from, to, isPackage, typesOnly} = each;
  const isTest = /\.spec\.ts$|\/test-support\//.test(from);
  const [zone = ''] = from.split('/');
  if (isPackage) {
    if (isTest) return undefined;
    if (zone === 'sim-core' && !from.startsWith('sim-core/analysis/'))
      return 'the engine takes no packages';
    if (zone === 'shared' && to !== 'zod') return 'zod is the only package in shared';
    return undefined;
  }
  const [reached = ''] = to.split('/');
  if (zone === 'sim-core')
    return reached === zone ? insideEngine(from, to, isTest) : 'sim-core imports only itself';
  if (zone === 'shared') {
    if (reached === 'shared') return undefined;
    if (reached !== 'sim-core') return 'shared imports only itself and types of sim-core';
    return typesOnly || to === SHARED_VALUE_DOOR || isTest ? undefined : 'types of sim-core only';
  }
  if (reached === 'sim-core' && zone !== 'tools' && !ENGINE_DOORS.includes(to))
    return 'only the doors of sim-core';
  if (zone === 'server') {
    if (['src', 'test'].includes(reached)) return 'the server imports neither client nor tests';
    return isTest ? undefined : betweenServerFeatures(from, to);
  }
  if (zone === 'src') {
    if (['server', 'test', 'tools'].includes(reached)) return 'the client imports no server';
    return betweenClientFeatures(from, to);
  }
  if (zone === 'test' && reached === 'server') {
    return to === 'server/app' || to.startsWith('server/test-support/')
      ? undefined
      : 'tests start server/app.ts only';
  }
  // a benchmark measures what the client keeps of a run
  if (reached === 'src' && !from.startsWith('tools/bench/')) return 'nobody imports the client';
  return undefined;
}

function insideEngine(from: string, to: string, isTest: boolean): string | undefined {
  if (isTest) return undefined;
  const [, room] = from.split('/');
  const [, reached] = to.split('/');
  if (room !== 'analysis' && reached === 'analysis') return 'the engine never imports analysis';
  const rooms = [room, reached].sort().join();
  return rooms === 'control,plant' ? 'control and plant are joined by run alone' : undefined;
}

function betweenServerFeatures(from: string, to: string): string | undefined {
  const own = /^server\/features\/([^/]+)\//.exec(from)?.[1];
  const other = /^server\/features\/([^/]+)\//.exec(to)?.[1];
  if (own === undefined || other === undefined || own === other) return undefined;
  return to.endsWith('-service') ? undefined : 'of another feature only its -service';
}

function betweenClientFeatures(from: string, to: string): string | undefined {
  const own = /^src\/app\/([^/]+)\//.exec(from)?.[1];
  const other = /^src\/app\/([^/]+)\//.exec(to)?.[1];
  if (own === undefined || other === undefined || own === other) return undefined;
  return COMMON_ROOMS.includes(other) || to === SESSION
    ? undefined
    : 'a feature imports no other feature';
}

function target(file: string, specifier: string): {to: string; isPackage: boolean} {
  if (specifier.startsWith('#')) return {to: specifier.slice(1), isPackage: false};
  if (!specifier.startsWith('.')) return {to: specifier, isPackage: true};
  const to = path.posix.join(path.posix.dirname(file), specifier).replace(/\.(ts|js|mjs)$/, '');
  return {to, isPackage: false};
}

function importsTypesOnly({importClause}: ts.ImportDeclaration): boolean {
  if (importClause === undefined) return false; // for its effect
  if (importClause.phaseModifier === ts.SyntaxKind.TypeKeyword) return true;
  const {name, namedBindings} = importClause;
  if (name !== undefined || namedBindings === undefined || !ts.isNamedImports(namedBindings))
    return false;
  return namedBindings.elements.every((each) => each.isTypeOnly);
}
