export interface Label {
  /** Where the label would stand best: its middle, px. */
  at: number;
  width: number;
}

export interface PlacedLabel {
  start: number;
  /** 0 is the row beside the drawing; higher rows are further away. */
  row: number;
}

interface Space {
  width: number;
  /** Least room between two labels of a row. */
  gap?: number;
  /** How far a label may be pushed aside before it goes to another row. */
  reach?: number;
}

/**
 * Places labels along a line so that none overlaps another and none leaves the space. A label that would be pushed too
 * far from its place goes to the next row; there are as many rows as it takes. The answer keeps the order given.
 */
export function layoutLabels(labels: readonly Label[], { width, gap = 8, reach = 28 }: Space): PlacedLabel[] {
  const rowEnds: number[] = [];
  const placed = new Map<Label, PlacedLabel>();
  for (const label of [...labels].sort((a, b) => a.at - b.at)) {
    const wanted = Math.max(0, Math.min(label.at - label.width / 2, width - label.width));
    let row = 0;
    let start = startIn(rowEnds[row], wanted, gap);
    while (start - wanted > reach || (start > 0 && start + label.width > width)) {
      row += 1;
      start = startIn(rowEnds[row], wanted, gap);
    }
    rowEnds[row] = start + label.width;
    placed.set(label, { start, row });
  }
  return labels.map((label) => placed.get(label) ?? { start: 0, row: 0 });
}

function startIn(rowEnd: number | undefined, wanted: number, gap: number): number {
  return rowEnd === undefined ? wanted : Math.max(wanted, rowEnd + gap);
}

/** A safe upper bound of a text's width in Roboto; measuring would need the fonts to be there. */
export function textWidth(text: string, fontSize: number): number {
  return text.length * fontSize * 0.58 + 2;
}

/** Heights for labels beside the ends of lines: in order, at least `gap` apart, inside of 0 to `height`. */
export function spreadHeights(wanted: readonly number[], gap: number, height: number): number[] {
  const order = wanted.map((_, index) => index).sort((a, b) => (wanted[a] ?? 0) - (wanted[b] ?? 0));
  const result: number[] = [];
  let floor = 0;
  for (const index of order) {
    const at = Math.max(wanted[index] ?? 0, floor);
    result[index] = at;
    floor = at + gap;
  }
  let ceiling = height;
  for (const index of order.reverse()) {
    const at = Math.min(result[index] ?? 0, ceiling);
    result[index] = at;
    ceiling = at - gap;
  }
  return result;
}
