/** Milliseconds of one run: the least mean of several batches, which other work on the machine disturbs least. */
export function fastest(run: () => unknown, runs: number, batches: number): number {
  let best = Infinity;
  for (let batch = 0; batch < batches; batch += 1) {
    const start = performance.now();
    for (let at = 0; at < runs; at += 1) run();
    best = Math.min(best, (performance.now() - start) / runs);
  }
  return best;
}
