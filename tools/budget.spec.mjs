/* global describe, it, expect, beforeEach, afterEach */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {checkBudget, initialFiles} from './budget.mjs';

describe('the budget of the first page', () => {
  let folder;

  beforeEach(() => (folder = fs.mkdtempSync(path.join(os.tmpdir(), 'budget-'))));
  afterEach(() => fs.rmSync(folder, {recursive: true}));

  const write = (name, content) => fs.writeFileSync(path.join(folder, name), content);

  it('counts every script and style that the page names, once', () => {
    const html =
      '<link rel="stylesheet" href="a.css"><link rel="modulepreload" href="b.js"><script src="b.js"></script>';

    expect(initialFiles(html)).toEqual(['a.css', 'b.js']);
  });

  it('refuses a page that costs more, and one that names nothing', () => {
    write('index.html', '<script src="main.js"></script>');
    // Random hexadecimal digits shrink to about half: 600 kB stay over 250.
    const noise = Array.from({length: 600_000}, () => Math.floor(Math.random() * 16).toString(16));
    write('main.js', noise.join(''));
    expect(() => checkBudget(folder)).toThrowError(/on the wire/);

    write('index.html', '<p>nothing</p>');
    expect(() => checkBudget(folder)).toThrowError(/measures nothing/);
  });

  it('lets a small page pass and says what it costs', () => {
    write('index.html', '<script src="main.js"></script>');
    write('main.js', 'go();');

    expect(checkBudget(folder)).toBeLessThan(1);
  });
});
