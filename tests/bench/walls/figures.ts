/** Nearest-rank percentile. */
export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)] ?? NaN;
}

/** Least-squares slope of y over x. */
export function slope(points: readonly (readonly [x: number, y: number])[]): number {
  const mean = (at: 0 | 1): number => points.reduce((sum, point) => sum + point[at], 0) / points.length;
  const [x0, y0] = [mean(0), mean(1)];
  const above = points.reduce((sum, [x, y]) => sum + (x - x0) * (y - y0), 0);
  return above / points.reduce((sum, [x]) => sum + (x - x0) ** 2, 0);
}

export const spread = (values: readonly number[]): string =>
  `p50 ${percentile(values, 0.5).toFixed(0)} ms, p99 ${percentile(values, 0.99).toFixed(0)} ms`;
