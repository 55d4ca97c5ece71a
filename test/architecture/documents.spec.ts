import {existsSync} from 'node:fs';
import path from 'node:path';
import {filesBelow, read, ROOT} from './files';

const DOCUMENTS = ['README.md', 'DEVELOPERS.md', ...filesBelow(['docs', 'sim-core'])].filter(
  (file) => file.endsWith('.md'),
);
/** Made by running the project, so not in a clone. */
const MADE = /^(node_modules|dist|\.pg|\.run|\.angular|coverage|test-results)(\/|$)/;

/** Paths in back-ticks or links: they hold a slash or a known ending, and no blank or placeholder. */
function pathsNamedIn(text: string): string[] {
  const quoted = [...text.matchAll(/`([^`\n]+)`/g)].map((match) => match[1] ?? '');
  const linked = [...text.matchAll(/\]\(([^)\s]+)\)/g)].map((match) => match[1] ?? '');
  const looksLikePath = (each: string): boolean =>
    /^[\w.-]+(\/[\w.-]+)*\/?$/.test(each) &&
    (/^(\.\/)?[\w.-]+\//.test(each) || /\.(ts|mjs|json|md|html|scss)$/.test(each));
  const isEnding = (each: string): boolean => /^\.\w+(\.\w+)?$/.test(each); // as in `.rows.ts`
  return [
    ...quoted.filter((each) => looksLikePath(each) && !isEnding(each)),
    ...linked.filter((each) => !/^(https?:|#)/.test(each)),
  ];
}

/** Every file's name without its folder: documents may name a file alone. */
const names = new Set(filesBelow().map((file) => path.basename(file)));

function isThere(named: string, document: string): boolean {
  if (MADE.test(named) || names.has(named)) return true;
  const places = [ROOT, path.join(ROOT, path.dirname(document)), path.join(ROOT, 'src')];
  return places.some((place) => existsSync(path.join(place, named)));
}

describe('documents', () => {
  for (const document of DOCUMENTS) {
    it(`${document} names only paths that exist`, () => {
      const named = pathsNamedIn(read(document));

      expect(named.filter((each) => !isThere(each, document))).toEqual([]);
    });
  }

  it('are searched for paths', () => {
    const text =
      'See `server/app.ts`, `npm start`, [the model](sim-core/PHYSICS.md), `a / b` and `gone/file.ts`.';

    expect(pathsNamedIn(text)).toEqual(['server/app.ts', 'gone/file.ts', 'sim-core/PHYSICS.md']);
    expect(isThere('gone/file.ts', 'README.md')).toBeFalse();
  });

  it('README.md names scripts that package.json has', () => {
    const {scripts} = JSON.parse(read('package.json')) as {scripts: Record<string, string>};
    const text = read('README.md') + read('DEVELOPERS.md');
    const named = [...text.matchAll(/npm (?:run )?(?:-s )?((?:start|test|[\w]+)(?::\w+)?)/g)].map(
      (match) => match[1] ?? '',
    );
    const own = ['ci', 'install'];

    expect(named.filter((name) => !own.includes(name) && !(name in scripts))).toEqual([]);
    expect(named).toContain('start');
    expect(named).toContain('test');
  });
});
