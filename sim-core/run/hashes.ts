/** Fingerprints of the engine with this number: hashes.spec.ts says of what, and when they may change. */
export const BYTES: {
  readonly engine: number;
  readonly hashes: Readonly<Record<string, string>>;
} = {
  engine: 2,
  hashes: {
    a: '05e90652c75c43e3',
    b: 'e789336a1465308b',
    c: 'ac30c4d521053436',
    d: '04ef892aefd17993',
    e: '8c1c6fbdd4623dc1',
    f: 'e3bc34c664562746',
    g: '01759a6b1940ad29',
    noise: '2057670192d814dc',
    live: 'fd53b634774daf29',
  },
};
