/** Of every demo account: known to everybody, which is why the demo exists on loopback only. */
export const DEMO_PASSWORD = 'even tension';
