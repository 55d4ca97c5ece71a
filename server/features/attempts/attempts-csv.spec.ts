import {csvCell} from './attempts-csv';

describe('a cell of a table', () => {
  const cells: [value: string | number | null, written: string][] = [
    ['Ann', 'Ann'],
    ['=1+1', "'=1+1"],
    ['+49', "'+49"],
    ['-x', "'-x"],
    ['@x', "'@x"],
    ['\tx', "'\tx"],
    ['a=b', 'a=b'],
    [-2.5, '-2.5'],
    [null, ''],
    ['a,b', '"a,b"'],
    ['say "x"', '"say ""x"""'],
    ['two\nlines', '"two\nlines"'],
    ['=a,b', `"'=a,b"`],
  ];
  for (const [value, written] of cells) {
    it(`writes ${JSON.stringify(value)} as ${JSON.stringify(written)}`, () => {
      expect(csvCell(value)).toBe(written);
    });
  }
});
