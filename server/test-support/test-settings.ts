/** The environment of a server under test. */
export function testSettings(
  databaseUrl: string,
  settings: Record<string, string> = {},
): Record<string, string> {
  return {
    DATABASE_URL: databaseUrl,
    SESSION_SECRET: 'only-for-tests'.repeat(4),
    NODE_ENV: 'test',
    ...settings,
  };
}
