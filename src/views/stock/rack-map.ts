import { glyphOf } from '@shared/domain/glyph.ts';
import { positionAt } from '@shared/domain/positions.ts';
import type { RackPage, RackPlug } from '@shared/contracts/stock.ts';

/** Classes of days until a plug can be sold, from ready to far off; sizes and shades of the map follow them. */
export const READINESS = [
  { key: 'ready', label: 'ready', radius: 19 },
  { key: 'near', label: 'under 14', radius: 17 },
  { key: 'middle', label: '14 to 42', radius: 14 },
  { key: 'far', label: 'over 42', radius: 11 },
] as const;
export type Readiness = (typeof READINESS)[number];

export interface MapCell {
  position: string;
  row: number;
  column: number;
  plug: RackPlug | null;
}

export function readinessOf(daysToGrade: number | null): Readiness {
  if (daysToGrade === null || daysToGrade > 42) return READINESS[3];
  if (daysToGrade >= 14) return READINESS[2];
  return daysToGrade > 0 ? READINESS[1] : READINESS[0];
}

/** The positions of a rack in reading order, each with the plug that stands there. */
export function cellsOf({ rows, columns, places }: Pick<RackPage, 'rows' | 'columns' | 'places'>): MapCell[] {
  const plugs = new Map(places.map((plug) => [plug.position, plug]));
  return Array.from({ length: rows * columns }, (_, index) => {
    const row = Math.floor(index / columns);
    const column = (index % columns) + 1;
    const position = positionAt(row, column);
    return { position, row, column, plug: plugs.get(position) ?? null };
  });
}

/** Strokes inside a disc of a radius that tell lines apart without colour: the septa of the line's glyph. */
export function septaPath(lineCode: string, radius: number): string {
  const { septa, reach, turn } = glyphOf(lineCode).features;
  const inner = radius * Math.max(0.25, 1 - reach);
  return Array.from({ length: septa }, (_, index) => {
    const angle = (2 * Math.PI * (index + turn)) / septa;
    const at = (distance: number) => `${round(Math.cos(angle) * distance)} ${round(Math.sin(angle) * distance)}`;
    return `M${at(radius * 0.86)}L${at(inner)}`;
  }).join('');
}

/** What a position says to someone who can not see the map. */
export function cellWords({ position, plug }: MapCell): string {
  if (!plug) return `${position}, free`;
  const ready =
    plug.daysToGrade === 0
      ? 'ready'
      : plug.daysToGrade === null
        ? 'far from grade'
        : `${plug.daysToGrade} days to grade`;
  return `${position}, ${plug.lineCode}, plug ${plug.number} of ${plug.batchCode}, ${ready}${plug.withheld ? ', withheld' : ''}`;
}

function round(value: number): string {
  return value.toFixed(2);
}
