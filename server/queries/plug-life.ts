import { eq } from 'drizzle-orm';
import type { PlugPage, StockAct } from '../../shared/contracts/stock.ts';
import { startOfDay, type Day } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';
import { withholds } from '../db/schema/index.ts';
import type { Stay } from './plug-stays.ts';

type Segment = PlugPage['life']['segments'][number];
type Pin = PlugPage['life']['pins'][number];

const SYSTEM_WORDS = { growout: 'grow-out', broodstock: 'broodstock', quarantine: 'quarantine' } as const;

const PIN_WORDS: Partial<Record<StockAct['kind'], string>> = {
  place: 'placed',
  move: 'moved',
  loss: 'lost',
  cull: 'culled',
  give: 'given away',
  recut: 'cut again',
  pick: 'picked',
  ship: 'sold',
};

/** The life line of a plug: where it stood, healing first, and what happened on the way. */
export function plugLife(
  db: Db,
  plug: { code: string; healedOn: Day; measurements: PlugPage['measurements']; acts: readonly StockAct[] },
  stays: readonly Stay[],
  { timeZone, now }: { timeZone: string; now: number },
): PlugPage['life'] {
  const healedAt = startOfDay(plug.healedOn, timeZone);
  const ended = stays.at(-1)?.to ?? null;
  const pins: Pin[] = [
    ...stays.slice(0, 1).map(({ from }) => ({ kind: 'cut', label: 'cut', at: from })),
    ...(healedAt <= (ended ?? now) ? [{ kind: 'healed', label: 'healed', at: healedAt }] : []),
    ...plug.measurements.map(({ sizeMm, at }) => ({ kind: 'measured', label: `${Math.round(sizeMm)} mm`, at })),
    ...plug.acts.flatMap(({ kind, at, undone }) => {
      const label = PIN_WORDS[kind];
      return label && !undone ? [{ kind, label, at }] : [];
    }),
    ...withholdPins(db, plug.code),
  ];
  return {
    segments: joined(stays.flatMap((stay) => segmentsOf(stay, healedAt))),
    pins: pins.sort((a, b) => a.at - b.at),
  };
}

/** A move within a system does not break the line. */
function joined(segments: readonly Segment[]): Segment[] {
  return segments.reduce<Segment[]>((line, segment) => {
    const last = line.at(-1);
    const goesOn = last !== undefined && last.kind === segment.kind && last.label === segment.label;
    return goesOn ? [...line.slice(0, -1), { ...last, to: segment.to }] : [...line, segment];
  }, []);
}

/** A stay that healing ended in is two segments. */
function segmentsOf(stay: Stay, healedAt: number): Segment[] {
  if (stay.place === 'picked') return [{ kind: 'picked', label: 'picked', from: stay.from, to: stay.to }];
  const after = afterHealing(stay);
  if (healedAt <= stay.from) return [{ ...after, from: stay.from, to: stay.to }];
  const healing = { kind: 'healing', label: 'healing', from: stay.from } as const;
  if (stay.to !== null && healedAt >= stay.to) return [{ ...healing, to: stay.to }];
  return [
    { ...healing, to: healedAt },
    { ...after, from: healedAt, to: stay.to },
  ];
}

function afterHealing({ systemKind, systemName }: Stay): Pick<Segment, 'kind' | 'label'> {
  if (systemKind === null || systemName === null) return { kind: 'bench', label: 'bench' };
  return { kind: systemKind, label: `${SYSTEM_WORDS[systemKind]}, ${systemName}` };
}

function withholdPins(db: Db, plugCode: string): Pin[] {
  return db
    .select()
    .from(withholds)
    .where(eq(withholds.plugCode, plugCode))
    .all()
    .flatMap(({ startedAt, endedAt }) => [
      { kind: 'withheld', label: 'withheld', at: startedAt },
      ...(endedAt === null ? [] : [{ kind: 'released', label: 'released', at: endedAt }]),
    ]);
}
