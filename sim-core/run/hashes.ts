/** Fingerprints of the engine with this number: hashes.spec.ts says of what, and when they may change. */
export const BYTES: {
  readonly engine: number;
  readonly hashes: Readonly<Record<string, string>>;
} = {
  engine: 2,
  hashes: {
    a: '8033ecd5ddaf6c6f',
    b: '80714126cb3e86fe',
    c: '541b64b556ff76e8',
    d: '2d676d38b3e336a1',
    e: 'b5076689d5d10e0e',
    f: 'f1516534fb934ff5',
    g: '582dec44adf3c20b',
    noise: '2057670192d814dc',
    live: 'fd53b634774daf29',
  },
};
