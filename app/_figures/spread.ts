/**
 * Moves labels along one line so that neighbours stand at least `gap` apart, each as near its wish as can be in the
 * least-squares sense, and all between `low` and `high` where they fit. Pooling of adjacent violators: labels that
 * touch form a block whose place is the mean of its members' wishes. Returns places in the order of `wishes`.
 */
export function spreadApart(wishes: readonly number[], gap: number, low: number, high: number): number[] {
  const order = wishes
    .map((wish, index) => ({ wish, index }))
    .sort((a, b) => a.wish - b.wish || a.index - b.index);
  // In coordinates where neighbours may coincide (each shifted by its rank), "apart" becomes "not decreasing".
  const blocks: { sum: number; size: number }[] = [];
  order.forEach(({ wish }, rank) => {
    let block = { sum: wish - rank * gap, size: 1 };
    for (let before = blocks.at(-1); before && mean(before) > mean(block); before = blocks.at(-1)) {
      blocks.pop();
      block = { sum: before.sum + block.sum, size: before.size + block.size };
    }
    blocks.push(block);
  });
  const room = Math.max(low, high - (order.length - 1) * gap);
  const places = new Array<number>(wishes.length).fill(0);
  let rank = 0;
  for (const block of blocks) {
    const base = Math.min(room, Math.max(low, mean(block)));
    for (let i = 0; i < block.size; i += 1, rank += 1) {
      const member = order[rank];
      if (member) places[member.index] = base + rank * gap;
    }
  }
  return places;
}

function mean(block: { sum: number; size: number }): number {
  return block.sum / block.size;
}
