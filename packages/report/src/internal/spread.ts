/**
 * Labels that keep their distance.
 * @module
 */

/**
 * Moves positions apart along one line until each keeps its distance from the one before, and moves them as little as
 * it takes to stay within the ends.
 *
 * @param wanted - Rising positions.
 * @param distance - Least distance from the position before, for all or for each.
 * @param low - Nothing below this.
 * @param high - Nothing above this, as long as there is room.
 */
export function spread(
  wanted: readonly number[],
  distance: number | readonly number[],
  low: number,
  high: number,
): number[] {
  const apart = (i: number): number =>
    typeof distance === 'number' ? distance : (distance[i] as number);
  const out: number[] = [];
  // Clusters that touch move as one, to the mean of what their members want.
  let clusters: { first: number; size: number; at: number }[] = [];
  const offsets = wanted.map(() => 0);
  for (let i = 0; i < wanted.length; i++) {
    clusters.push({ first: i, size: 1, at: wanted[i] as number });
    for (;;) {
      const last = clusters[clusters.length - 1];
      const before = clusters[clusters.length - 2];
      if (!last || !before) break;
      const end = before.at + (offsets[before.first + before.size - 1] as number);
      if (last.at >= end + apart(last.first)) break;
      const shift = (offsets[last.first - 1] as number) + apart(last.first);
      for (let k = last.first; k < last.first + last.size; k++) {
        offsets[k] = (offsets[k] as number) + shift;
      }
      const size = before.size + last.size;
      let mean = 0;
      for (let k = before.first; k < before.first + size; k++) {
        mean += ((wanted[k] as number) - (offsets[k] as number)) / size;
      }
      clusters = [...clusters.slice(0, -2), { first: before.first, size, at: mean }];
    }
  }
  for (const { first, size, at } of clusters) {
    for (let k = first; k < first + size; k++) out[k] = at + (offsets[k] as number);
  }
  for (let i = out.length - 1; i >= 0; i--) {
    const limit = i === out.length - 1 ? high : (out[i + 1] as number) - apart(i + 1);
    out[i] = Math.min(out[i] as number, limit);
  }
  for (let i = 0; i < out.length; i++) {
    const limit = i === 0 ? low : (out[i - 1] as number) + apart(i);
    out[i] = Math.max(out[i] as number, limit);
  }
  return out;
}
