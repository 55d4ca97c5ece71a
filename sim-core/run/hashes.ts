/** Fingerprints of the engine with this number: hashes.spec.ts says of what, and when they may change. */
export const BYTES: {
  readonly engine: number;
  readonly hashes: Readonly<Record<string, string>>;
} = {
  engine: 2,
  hashes: {
    a: '8033ecd5ddaf6c6f',
    b: '80714126cb3e86fe',
    c: '854b45834745bba3',
    d: '4b45f13566bb52a4',
    e: 'b5076689d5d10e0e',
    f: 'f1516534fb934ff5',
    g: 'be8b8f0894e443c9',
    noise: '2057670192d814dc',
    live: 'fd53b634774daf29',
  },
};
