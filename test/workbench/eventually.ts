/** Asks again until it fits; the last answer is handed back, so that a failure shows it. */
export async function eventually<T>(
  ask: () => Promise<T>,
  fits: (value: T) => boolean,
  within = 30_000,
): Promise<T> {
  const end = Date.now() + within;
  for (;;) {
    const value = await ask();
    if (fits(value) || Date.now() > end) return value;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}
