/** Fingerprints of the engine with this number: hashes.spec.ts says of what, and when they may change. */
export const BYTES: {
  readonly engine: number;
  readonly hashes: Readonly<Record<string, string>>;
} = {
  engine: 1,
  hashes: {
    a: '7895a02aaaeab90a',
    b: '1271835636d25cef',
    c: 'f965fd3099177ee2',
    d: '88c4b13e301315d2',
    e: '27e9ba7b9eb56f65',
    f: 'a758ecf9a8a4d6b6',
    g: '93db76bc038d77ba',
    noise: 'c33a12baf5d22e53',
    live: 'a8ff85e579790362',
  },
};
