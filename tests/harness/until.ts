/** Looks again and again until something holds; fails with the last reason when it never does. No fixed sleep. */
export async function until<T>(look: () => Promise<T> | T, timeoutMs = 10_000): Promise<T> {
  const deadline = Date.now() + timeoutMs;
  for (;;) {
    try {
      return await look();
    } catch (error) {
      if (Date.now() > deadline) throw error;
      await new Promise((resolve) => {
        setTimeout(resolve, 20);
      });
    }
  }
}
