/**
 * Moves labels apart as little as possible (least squares), keeping their order.
 *
 * With `gap` between neighbours, y_i - i·gap must not decrease: an isotonic regression, solved by pooling adjacent violators.
 * Source: Barlow, Bartholomew, Bremner and Brunk, Statistical Inference under Order Restrictions (1972), section 1.2.
 * @param wanted where each label would stand, in any order
 * @param gap least distance between two @param low @param high bounds of all
 * @returns where each stands, in the order given; when they cannot all fit, the gap shrinks evenly
 */
export function spread(wanted: readonly number[], gap: number, low: number, high: number): readonly number[] {
  const count = wanted.length;
  if (count === 0) return [];
  const room = Math.max(0, high - low);
  const step = count > 1 ? Math.min(gap, room / (count - 1)) : 0;
  const order = wanted.map((_, i) => i).sort((a, b) => (wanted[a] ?? 0) - (wanted[b] ?? 0) || a - b);
  const pools: { sum: number; size: number }[] = [];
  order.forEach((index, rank) => {
    let pool = { sum: (wanted[index] ?? 0) - rank * step, size: 1 };
    for (let last = pools.at(-1); last && last.sum / last.size > pool.sum / pool.size; last = pools.at(-1)) {
      pools.pop();
      pool = { sum: last.sum + pool.sum, size: last.size + pool.size };
    }
    pools.push(pool);
  });
  const placed: number[] = new Array(count).fill(0);
  let rank = 0;
  for (const pool of pools) {
    const level = Math.min(Math.max(pool.sum / pool.size, low), Math.max(low, high - (count - 1) * step));
    for (let k = 0; k < pool.size; k += 1) {
      placed[order[rank] ?? 0] = level + rank * step;
      rank += 1;
    }
  }
  return placed;
}
