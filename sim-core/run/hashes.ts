/** Fingerprints of the engine with this number: hashes.spec.ts says of what, and when they may change. */
export const BYTES: {
  readonly engine: number;
  readonly hashes: Readonly<Record<string, string>>;
} = {
  engine: 2,
  hashes: {
    a: '0fee82e1debbcf8b',
    b: '622b375035f84740',
    c: 'c2384706563e1347',
    d: 'aa6b9616ed772a21',
    e: '0c51a50c1e1b1f88',
    f: '693e1f7a6ce61254',
    g: '81be5bbeaa0f2394',
    noise: '906cb1ab0aeaa4b5',
    live: 'd734b9363620e5b9',
  },
};
