/** Lets other requests in between two pieces of a long answer. */
export async function* breathing<T>(pieces: Iterable<T>): AsyncGenerator<T> {
  for (const piece of pieces) {
    yield piece;
    await new Promise((resolve) => setImmediate(resolve));
  }
}
