const LINE = 16;

/** Heights of the names at the ends of their lines, moved apart where lines end close together. */
export function spreadNames(heights: number[], frame: { top: number; bottom: number }): number[] {
  const order = heights.map((_, i) => i).sort((a, b) => heights[a] - heights[b]);
  const placed = [...heights];
  for (const [rank, i] of order.entries()) {
    const above = rank === 0 ? frame.top - LINE : placed[order[rank - 1]];
    placed[i] = Math.max(heights[i], above + LINE);
  }
  for (const [rank, i] of [...order].reverse().entries()) {
    const below = rank === 0 ? frame.bottom + LINE : placed[order[order.length - rank]];
    placed[i] = Math.min(placed[i], below - LINE);
  }
  return placed;
}
