/** What to do when limewater has run into a system. Common practice, no source; a farm may have a stricter card. */
export interface OverfillStep {
  /** What to do. */
  text: string;
  /** Why, or what to mind. */
  mind: string;
}

export const OVERFILL_STEPS: readonly OverfillStep[] = [
  {
    text: 'Stop the pump and take its hose out of the water.',
    mind: 'Pull the plug with dry hands. A hose left under water may go on as a siphon.',
  },
  {
    text: 'Full flow and full aeration: all pumps, skimmer, air stones, lids open.',
    mind: 'Carbon dioxide from the air brings the pH down. Fresh air into the room helps.',
  },
  {
    text: 'Read pH, alkalinity, salinity and temperature, and write them down.',
    mind: 'Take the water from the tanks, well away from where the limewater came in.',
  },
  {
    text: 'Keep milky water stirred and filtered; take out what settles.',
    mind: 'The snow is chalk. It takes alkalinity with it, so the level may fall below where it began.',
  },
  {
    text: 'Stop all other supplements. Do not chase the numbers with more salts.',
    mind: 'What went in cannot be balanced away; each more salt is another change for the corals.',
  },
  {
    text: 'Change water where the pH stays high or salinity has fallen: same temperature, usual alkalinity.',
    mind: 'In steps of a tenth to a fifth of the volume. Raise salinity slowly, over a day or more.',
  },
  {
    text: 'Dilute acid or vinegar only where the farm’s own card allows it, and within its limits.',
    mind: 'Too much takes the pH down faster than corals bear. Never strong acid into the system.',
  },
  {
    text: 'Test again after 1, 4 and 24 hours, and find out why the control stuck before it runs again.',
    mind: 'Float, sensor, siphon, timer. A second, independent cut-off belongs on every top-off.',
  },
];

/** Beside the steps; the product's safety sheet, local rules and licensed people come first. */
export const OVERFILL_CAUTIONS: readonly string[] = [
  'Limewater is caustic: goggles and gloves. In the eyes, rinse for many minutes, then see a doctor. The product’s safety sheet comes first.',
  'Water on the floor and electricity: switch off at the breaker before you reach in. Wiring is for a licensed electrician.',
];

/** Hours after an overfill at which the water is tested again (common practice, no source). */
export const OVERFILL_TEST_HOURS = [1, 4, 24] as const;
