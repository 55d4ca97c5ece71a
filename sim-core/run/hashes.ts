/** Fingerprints of the engine with this number: hashes.spec.ts says of what, and when they may change. */
export const BYTES: {
  readonly engine: number;
  readonly hashes: Readonly<Record<string, string>>;
} = {
  engine: 1,
  hashes: {
    a: '68858206e89bcf9c',
    b: '75c4388cde0890f6',
    c: '46e27e48a91653ae',
    d: '41b180a7b909ce94',
    e: 'c50927e4818f1cb8',
    f: 'ef0796619aaff843',
    g: 'b331997c04745fda',
    noise: '0f009fd91f7b0acf',
    live: 'ba45c97173e338c3',
  },
};
