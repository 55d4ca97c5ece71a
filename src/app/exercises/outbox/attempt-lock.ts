/** Keeps a second tab of this browser out of an attempt. Resolves to how to let go, or null when another tab holds it. */
export function holdAttempt(attemptId: string): Promise<(() => void) | null> {
  return new Promise((resolve, reject) => {
    navigator.locks
      .request(
        `evenspan.attempt.${attemptId}`,
        {ifAvailable: true},
        (lock) =>
          new Promise<void>((letGo) => {
            if (lock === null) {
              resolve(null);
              letGo();
            } else resolve(letGo);
          }),
      )
      .catch(reject);
  });
}
