/** Fingerprints of the engine with this number: hashes.spec.ts says of what, and when they may change. */
export const BYTES: {
  readonly engine: number;
  readonly hashes: Readonly<Record<string, string>>;
} = {
  engine: 2,
  hashes: {
    a: '6a712dc0ddaf6c6f',
    b: '614bc15ccb3e86fe',
    c: 'ecd6ea2056ff76e8',
    d: '4b45f13566bb52a4',
    e: '3e0ee0b25c9ceb7d',
    f: '8d941869fb934ff5',
    g: '18302324adf3c20b',
    noise: '2057670192d814dc',
    live: 'fd53b634774daf29',
  },
};
