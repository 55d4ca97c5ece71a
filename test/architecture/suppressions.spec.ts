import allowed from './suppressions.json';
import {filesBelow, read} from './files';

/** What silences the compiler, the linter or the formatter; the words are split so that this file has none. */
const SILENCERS = new RegExp(
  ['eslint-' + 'disable', '@ts-' + '(?:expect-error|ignore|nocheck)', 'prettier-' + 'ignore'].join(
    '|',
  ),
);
const CODE = /\.(ts|mjs|cjs|html|scss)$/;

function silencedLines(file: string): string[] {
  return read(file)
    .split('\n')
    .filter((line) => SILENCERS.test(line));
}

describe('suppressions', () => {
  const files = filesBelow().filter((file) => CODE.test(file));

  it('do not grow; where they shrink, suppressions.json shrinks with them', () => {
    const counted = files
      .map((file) => [file, silencedLines(file).length] as const)
      .filter(([, count]) => count > 0);

    expect(Object.fromEntries(counted)).toEqual(allowed);
  });

  it('give their reason on the same line', () => {
    const bare = files.flatMap((file) =>
      silencedLines(file)
        .filter((line) => !/--\s*\S{2,}|@ts-[a-z-]+\s+\S{2,}/.test(line))
        .map((line) => `${file}: ${line.trim()}`),
    );

    expect(bare).toEqual([]);
  });
});
