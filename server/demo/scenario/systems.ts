import type { SystemKind } from '../../../shared/contracts/systems.ts';

export interface SystemSpec {
  code: string;
  name: string;
  kind: SystemKind;
  netVolumeL: number;
  note: string;
  /** Racks in each tank; the first tank of a grow-out system is its nursery. */
  tanks: readonly { name: string; racks: number }[];
  /** Part of the new batches that go here. */
  share: number;
  /** Evaporation, part of the volume in a day; reservoirs are sized by it. Zero: no limewater. */
  evaporation: number;
  /** Reservoirs change over every six days, so many days before the last one. */
  changeOverOffset: number;
  /** Alkalinity is tested on these ISO weekdays. */
  testDays: readonly number[];
}

const DAILY = [1, 2, 3, 4, 5, 6, 7];
const THRICE = [1, 3, 5];

export const SYSTEMS: readonly SystemSpec[] = [
  {
    ...{ code: 'A', name: 'Long Run', kind: 'growout', netVolumeL: 3400, share: 0.33, evaporation: 0.0115 },
    note: 'North greenhouse. Its lids were closed a month ago, so it evaporates less.',
    tanks: [
      { name: 'Long Run nursery', racks: 3 },
      { name: 'Long Run west', racks: 5 },
      { name: 'Long Run east', racks: 5 },
    ],
    ...{ changeOverOffset: 3, testDays: DAILY },
  },
  {
    ...{ code: 'B', name: 'Slipway', kind: 'growout', netVolumeL: 2600, share: 0.27, evaporation: 0.0125 },
    note: '',
    tanks: [
      { name: 'Slipway nursery', racks: 3 },
      { name: 'Slipway upper', racks: 5 },
      { name: 'Slipway lower', racks: 4 },
    ],
    ...{ changeOverOffset: 4, testDays: DAILY },
  },
  {
    ...{ code: 'C', name: 'Cooperage', kind: 'growout', netVolumeL: 1800, share: 0.17, evaporation: 0.012 },
    note: 'Its chiller failed once in the summer; watch it on hot days.',
    tanks: [
      { name: 'Cooperage nursery', racks: 2 },
      { name: 'Cooperage main', racks: 5 },
    ],
    ...{ changeOverOffset: 0, testDays: DAILY },
  },
  {
    ...{ code: 'D', name: 'Saltings', kind: 'growout', netVolumeL: 2200, share: 0.23, evaporation: 0.0125 },
    note: '',
    tanks: [
      { name: 'Saltings nursery', racks: 2 },
      { name: 'Saltings left', racks: 4 },
      { name: 'Saltings right', racks: 4 },
    ],
    ...{ changeOverOffset: 2, testDays: DAILY },
  },
  {
    ...{ code: 'E', name: 'Mother House', kind: 'broodstock', netVolumeL: 5000, share: 0, evaporation: 0.009 },
    note: 'The photometer here is away for repair, so it is tested now and then only.',
    tanks: [
      { name: 'Mother House front', racks: 4 },
      { name: 'Mother House back', racks: 4 },
    ],
    ...{ changeOverOffset: 1, testDays: THRICE },
  },
  {
    ...{ code: 'F', name: 'Gatehouse', kind: 'quarantine', netVolumeL: 800, share: 0, evaporation: 0 },
    note: 'Everything that arrives stays here for 45 days.',
    tanks: [{ name: 'Gatehouse', racks: 2 }],
    ...{ changeOverOffset: 5, testDays: THRICE },
  },
];
