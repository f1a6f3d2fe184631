import { GRADES, GROWTH_FORMS, type GradeCode } from '../../shared/domain/growth.ts';
import { PARAMETERS } from '../../shared/domain/units.ts';
import { addDays } from '../../shared/domain/days.ts';
import { farms, users } from '../db/schema/index.ts';
import { inWrite, SYSTEM, type Actor, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { createColony } from '../services/colony-service.ts';
import { createLine } from '../services/line-service.ts';
import { createListing } from '../services/listing-service.ts';
import { createRack } from '../services/rack-service.ts';
import { createReservoir } from '../services/reservoir-set-up.ts';
import { createStore } from '../services/store-service.ts';
import { createItem, createSupplier } from '../services/supply-items.ts';
import { createSystem, createTank } from '../services/system-service.ts';
import type { Chance } from './chance.ts';
import { FARM, STAFF, STORES, type StaffKey } from './scenario/farm.ts';
import { careText, LINES, WEAK_LINE } from './scenario/lines.ts';
import { ITEMS, SUPPLIERS, type ItemKey } from './scenario/supplies.ts';
import { SYSTEMS, type SystemSpec } from './scenario/systems.ts';
import type { DemoItem, DemoLine, DemoMother, DemoRack, DemoReservoir, DemoSystem } from './world.ts';

const MOTHERS = 90;
/** Mothers that are still in quarantine at the end. */
const NEWCOMERS = 3;
const RACK = { rows: 8, columns: 12 };

/** All reservoirs are drums of one height, covered, with their intake at the usual height. */
const VESSEL = { heightMm: 800, intakeMm: 32, covered: true, replaceDays: 7, sludgeWeeks: 8 } as const;
/** A square metre of open water loses this much a day in the greenhouse, L. */
const EVAPORATION_L_PER_M2 = 4.4;

export interface People {
  staff: Record<StaffKey, Actor>;
  buyers: Actor[];
}

/** The farm, the people who sign in and the stores that buy. */
export function furnishPeople(deps: Deps, passwordHash: string): People {
  return inWrite(deps, SYSTEM, (write) => {
    const { settings, ...farm } = FARM;
    write.tx
      .insert(farms)
      .values({ id: 1, ...farm, settings, demo: true, createdAt: write.now })
      .run();
    write.audit({ action: 'farm.created', entity: 'farm', entityId: '1', after: farm });
    const staff = STAFF.map((person, index) => [person.key, addPerson(write, person, null, index)] as const);
    const buyers = STORES.map(({ buyer, ...fields }, index) => {
      const store = createStore(write, fields);
      const email = `buyer.${store.code.toLowerCase()}@example.com`;
      return addPerson(write, { role: 'buyer', name: buyer, email }, store.id, staff.length + index);
    });
    return { staff: Object.fromEntries(staff) as Record<StaffKey, Actor>, buyers };
  });

  function addPerson(
    write: Write,
    { role, name, email }: { role: (typeof STAFF)[number]['role']; name: string; email: string },
    storeId: string | null,
    order: number,
  ): Actor {
    const userId = write.newId();
    // A second apart, so that they are offered in this order.
    const createdAt = write.now + order * 1000;
    write.tx
      .insert(users)
      .values({ id: userId, email, name, role, storeId, passwordHash, demo: true, createdAt })
      .run();
    write.audit({ action: 'user.created', entity: 'user', entityId: userId, after: { name, email, role } });
    return { userId, name, role, storeId };
  }
}

/** Supplies of every kind and who delivers them. */
export function furnishSupplies(write: Write): Record<ItemKey, DemoItem> {
  const suppliers = new Map(SUPPLIERS.map((supplier) => [supplier.name as string, createSupplier(write, supplier)]));
  const made = ITEMS.map((spec) => {
    const { key, code, name, kind, unit, packSize, leadTimeDays, safetyDays, strength } = spec;
    const supplierId = suppliers.get(spec.supplier) ?? null;
    const fields = { code, name, kind, unit, packSize, leadTimeDays, safetyDays, strength, supplierId };
    const id = createItem(write, fields);
    return [key, { ...spec, id, ordered: false }] as const;
  });
  return Object.fromEntries(made) as Record<ItemKey, DemoItem>;
}

export function furnishSystems(write: Write): DemoSystem[] {
  return SYSTEMS.map((spec) => {
    const bands = PARAMETERS.map(({ code, band }) => ({ parameter: code, low: band.min, high: band.max }));
    const { code, name, kind, netVolumeL, note } = spec;
    const evaporated = (spec.evaporation * netVolumeL) / EVAPORATION_L_PER_M2;
    const surfaceM2 = evaporated > 0 ? Math.round(evaporated * 10) / 10 : null;
    const { id } = createSystem(write, { code, name, kind, netVolumeL, surfaceM2, note, bands });
    const system: DemoSystem = {
      ...{ spec, id, racks: [], reservoirs: reservoirsOf(write, spec, id), alkalinity: 2.94, at: write.now },
      ...{ demand: 0, flow: 0, vigour: 1, truth: { code, systemId: id, netVolumeL, days: [] } },
    };
    system.racks = racksOf(write, system);
    return system;
  });
}

function reservoirsOf(write: Write, { code, evaporation, netVolumeL }: SystemSpec, systemId: string): DemoReservoir[] {
  if (evaporation === 0) return [];
  const volumeL = Math.ceil((evaporation * netVolumeL * 8) / 10) * 10;
  return [1, 2].map((number) => {
    const { id } = createReservoir(write, { code: `LW-${code}${number}`, systemId, volumeL, ...VESSEL });
    return {
      id,
      volumeL,
      belowIntakeL: (volumeL * VESSEL.intakeMm) / VESSEL.heightMm,
      levelL: 0,
      strength: 0,
      online: false,
    };
  });
}

function racksOf(write: Write, system: DemoSystem): DemoRack[] {
  const { spec, id: systemId } = system;
  return spec.tanks.flatMap((tank, index) => {
    const tankCode = `${spec.code}${index + 1}`;
    const { id: tankId } = createTank(write, { systemId, code: tankCode, name: tank.name });
    const stage = spec.kind !== 'growout' ? 'mothers' : index === 0 ? 'nursery' : 'grow';
    return Array.from({ length: tank.racks }, (_, number): DemoRack => {
      const code = `${tankCode}-${number + 1}`;
      const { id } = createRack(write, { tankId, code, ...RACK });
      return { id, code, system, stage, free: RACK.rows * RACK.columns, withheld: false };
    });
  });
}

export function furnishLines(write: Write, chance: Chance): DemoLine[] {
  return LINES.map((spec, index) => {
    const form = GROWTH_FORMS.find(({ code }) => code === spec.growthForm);
    if (!form) throw new Error(`There is no growth form ${spec.growthForm}.`);
    const mmPerWeek = form.mmPerWeek * Math.exp(chance.normal(0, 0.15));
    // Half of the lines have been grown long enough for figures of their own.
    const known = index % 2 === 0 ? { mmPerWeek: Number(mmPerWeek.toFixed(1)), startMm: form.startMm } : null;
    const { code, tradeName, taxon, growthForm, publicText } = spec;
    const { id } = createLine(write, {
      ...{ code, tradeName, taxon, growthForm, publicText },
      careText: careText(spec.growthForm),
      origin: 'Farmed from a mother of a licensed trader; papers in the office.',
      citesSource: 'C',
      ...{ startMm: known?.startMm ?? null, mmPerWeek: known?.mmPerWeek ?? null, healDays: null },
    });
    const survival = spec.code === WEAK_LINE ? 0.5 : Math.min(0.97, form.survival + chance.normal(0, 0.02));
    return { spec, form, id, mmPerWeek, survival, wanted: chance.between(0.5, 1.6) };
  });
}

/** Mothers: most in the broodstock, some on racks of their own kind of water. The last ones are still in quarantine. */
export function furnishMothers(
  write: Write,
  world: { systems: readonly DemoSystem[]; lines: readonly DemoLine[] },
  chance: Chance,
): DemoMother[] {
  return Array.from({ length: MOTHERS - NEWCOMERS }, (_, index) => {
    const line = world.lines[index % world.lines.length];
    if (!line) throw new Error('There are no lines.');
    return addMother(write, { line, system: homeOf(world.systems, index), number: index + 1, from: 0 }, chance);
  });
}

export function addMother(
  write: Write,
  { line, system, number, from }: { line: DemoLine; system: DemoSystem; number: number; from: number },
  chance: Chance,
): DemoMother {
  const code = `M-${String(number).padStart(3, '0')}`;
  const racks = system.racks.filter(({ stage }) => stage !== 'nursery');
  const rack = racks[number % racks.length];
  if (!rack) throw new Error(`System ${system.spec.code} has no rack for ${code}.`);
  // Those that came lately are small.
  const sizeMm = Math.round(from === 0 ? chance.between(100, 190) : chance.between(35, 60));
  const acquiredOn = addDays(new Date(write.now).toISOString().slice(0, 10), from === 0 ? -30 - chance.int(700) : -1);
  const { id, restDays } = createColony(write, {
    ...{ code, lineId: line.id, rackId: rack.id, sizeMm, lastCutOn: null, acquiredOn },
    health: number % 31 === 0 ? 'watch' : 'good',
    acquiredFrom: chance.pick(['Licensed trader', 'Exchange with another farm', 'Own stock']),
  });
  return { id, code, line, system, restDays, sizeMm, lastCut: null, from };
}

function homeOf(systems: readonly DemoSystem[], index: number): DemoSystem {
  const code = index % 5 === 4 ? ['A', 'B', 'C', 'D'][Math.floor(index / 5) % 4] : 'E';
  const system = systems.find(({ spec }) => spec.code === code);
  if (!system) throw new Error(`There is no system ${code}.`);
  return system;
}

/** Prices beside that of a frag; a grade is offered where the line comes through it while it is grown. */
const PRICE_OF_GRADE: Partial<Record<GradeCode, number>> = { small: 0.7, frag: 1, large: 1.5, colony: 2.6 };

export function furnishListings(write: Write, lines: readonly DemoLine[]): void {
  for (const { id, spec, form } of lines) {
    for (const grade of GRADES) {
      const part = PRICE_OF_GRADE[grade.code];
      const next = GRADES[GRADES.indexOf(grade) + 1];
      if (part === undefined || (next && next.minMm <= form.startMm)) continue;
      createListing(write, {
        lineId: id,
        grade: grade.code,
        priceMinor: Math.round((spec.fragPrice * part) / 50) * 50,
      });
    }
  }
}
