/** Look again and again until there is something, or fail after the patience has run out. */
export async function until<T>(look: () => Promise<T | undefined>, patienceMs = 10_000): Promise<T> {
  const deadline = performance.now() + patienceMs;
  for (;;) {
    const found = await look();
    if (found !== undefined) return found;
    if (performance.now() > deadline) throw new Error(`Nothing came within ${patienceMs} ms.`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
