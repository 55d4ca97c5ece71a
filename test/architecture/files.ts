import {readdirSync, readFileSync, statSync} from 'node:fs';
import path from 'node:path';
import ts from 'typescript';

/** The project's folder. */
export const ROOT = path.resolve(import.meta.dirname, '..', '..');
const OWN_FOLDERS = ['sim-core', 'shared', 'server', 'src', 'test', 'tools'];

/** Paths from the project's folder, with `/`, of every file below these folders. */
export function filesBelow(folders: readonly string[] = OWN_FOLDERS): string[] {
  return folders.flatMap((folder) =>
    readdirSync(path.join(ROOT, folder), {recursive: true, encoding: 'utf8'})
      .map((name) => path.posix.join(folder, name))
      .filter((name) => statSync(path.join(ROOT, name)).isFile()),
  );
}

export function read(file: string): string {
  return readFileSync(path.join(ROOT, file), 'utf8');
}

export function parse(file: string, text = read(file)): ts.SourceFile {
  return ts.createSourceFile(file, text, ts.ScriptTarget.ES2022, true);
}

/** Calls `visit` for a node and everything below it. */
export function walk(node: ts.Node, visit: (each: ts.Node) => void): void {
  visit(node);
  node.forEachChild((child) => walk(child, visit));
}
