/* global describe, it, expect, beforeEach, afterEach */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {fingerprint} from './build.mjs';
import {checkNode, modulesAreInstalled} from './modules.mjs';

describe('what a start needs', () => {
  let root;
  beforeEach(() => {
    root = fs.mkdtempSync(path.join(os.tmpdir(), 'modules-'));
  });
  afterEach(() => fs.rmSync(root, {recursive: true}));
  const write = (file, content) => {
    fs.mkdirSync(path.join(root, path.dirname(file)), {recursive: true});
    fs.writeFileSync(path.join(root, file), content);
  };

  describe('of Node.js', () => {
    it('refuses one that is too old or too new, and says which it is', () => {
      expect(() => checkNode('18.19.0')).toThrowError(/this is 18\.19\.0/);
      expect(() => checkNode('20.10.0')).toThrowError(/needs Node\.js/);
      expect(() => checkNode('22.1.0')).toThrowError(/needs Node\.js/);
    });

    it('takes the 20 line from 20.19 on', () => {
      expect(() => checkNode('20.19.0')).not.toThrow();
      expect(() => checkNode('20.30.1')).not.toThrow();
    });
  });

  describe('of packages', () => {
    const packages = {
      '': {name: 'x'},
      'node_modules/a': {version: '1.0.0'},
      'node_modules/other-platform': {version: '1.0.0', optional: true},
    };
    const install = (present) =>
      write('node_modules/.package-lock.json', JSON.stringify({packages: present}));
    beforeEach(() => write('package-lock.json', JSON.stringify({packages})));

    it('is not met without node_modules, or with an npm ci broken off', () => {
      const without = modulesAreInstalled(root);
      fs.mkdirSync(path.join(root, 'node_modules', 'a'), {recursive: true});

      expect(without).toBeFalse();
      expect(modulesAreInstalled(root)).toBeFalse();
    });

    it('is met by what the lock names, but for other platforms', () => {
      install({'node_modules/a': {version: '1.0.0'}});

      expect(modulesAreInstalled(root)).toBeTrue();
    });

    it('is not met by another version', () => {
      install({'node_modules/a': {version: '0.9.0'}});

      expect(modulesAreInstalled(root)).toBeFalse();
    });
  });

  describe('of a build', () => {
    beforeEach(() => write('src/a.ts', 'one'));

    it('is the same for the same contents at another time', () => {
      const before = fingerprint(['src'], root);
      fs.utimesSync(path.join(root, 'src/a.ts'), 1, 1);

      expect(fingerprint(['src'], root)).toBe(before);
    });

    it('changes with a content, a name and a new file, not with a spec', () => {
      const before = fingerprint(['src'], root);
      write('src/a.spec.ts', 'spec');
      const withSpec = fingerprint(['src'], root);
      write('src/a.ts', 'two');
      const changed = fingerprint(['src'], root);
      fs.renameSync(path.join(root, 'src/a.ts'), path.join(root, 'src/b.ts'));
      const renamed = fingerprint(['src'], root);

      expect(withSpec).toBe(before);
      expect(new Set([before, changed, renamed]).size).toBe(3);
    });
  });
});
