import {read} from './files';

describe('package-lock.json', () => {
  const lock = JSON.parse(read('package-lock.json')) as {
    packages: Record<string, Record<string, unknown>>;
  };

  it('names no address to fetch from: every machine uses its own registry', () => {
    const fetched = Object.entries(lock.packages).filter(([, each]) => 'resolved' in each);

    expect(fetched.map(([place]) => place)).toEqual([]);
    expect(Object.keys(lock.packages).length).toBeGreaterThan(100);
  });

  it('has a checksum for every package', () => {
    const unchecked = Object.entries(lock.packages).filter(
      ([place, each]) => place !== '' && !('integrity' in each),
    );

    expect(
      unchecked.filter(([, each]) => each['inBundle'] !== true).map(([place]) => place),
    ).toEqual([]);
  });

  it('are named with their licences in NOTICE, as far as the program uses them when it runs', () => {
    const {dependencies} = JSON.parse(read('package.json')) as {dependencies: object};
    const notice = read('NOTICE');

    const unnamed = Object.keys(dependencies).filter((name) => !notice.includes(`  ${name} `));

    expect(unnamed).toEqual([]);
  });
});
