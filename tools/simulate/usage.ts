/** Wrong words on the command line or a file that cannot be used. */
export class UsageError extends Error {}
