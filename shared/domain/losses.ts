/** A code that is stored and the word people choose. */
export interface LossWord {
  code: string;
  label: string;
}

/** What was seen on the piece. Words of speed and look, not of cause (common practice, no source). */
export const LOSS_SEEN = [
  { code: 'rtn', label: 'Fast tissue loss (RTN)' },
  { code: 'stn', label: 'Slow tissue loss (STN)' },
  { code: 'bleached', label: 'Bleached' },
  { code: 'browned', label: 'Browned out' },
  { code: 'brown_jelly', label: 'Brown jelly' },
  { code: 'tip_burn', label: 'Tip burn' },
  { code: 'base_recession', label: 'Recession from the base' },
  { code: 'bite_marks', label: 'Bite marks' },
  { code: 'overgrown', label: 'Overgrown' },
  { code: 'missing', label: 'Missing' },
  { code: 'detached', label: 'Detached' },
  { code: 'broken', label: 'Broken' },
  { code: 'closed', label: 'Closed up' },
] as const satisfies readonly LossWord[];

/** The likely cause, for the farm to count losses by. */
export const LOSS_CAUSES = [
  { code: 'unknown', label: 'Not known' },
  { code: 'water_event', label: 'Alkalinity or salinity event' },
  { code: 'heat', label: 'Heat' },
  { code: 'light_step', label: 'Light step' },
  { code: 'cut_stress', label: 'Cut stress' },
  { code: 'pest', label: 'Pest' },
  { code: 'predation', label: 'Eaten by fish or crab' },
  { code: 'sting', label: 'Stung by a neighbour' },
  { code: 'smothering', label: 'Smothered by algae or cyanobacteria' },
  { code: 'plug_fall', label: 'Fell off the plug or rack' },
  { code: 'handling', label: 'Handling' },
  { code: 'shipping_return', label: 'Returned from shipping' },
] as const satisfies readonly LossWord[];

export type LossSeen = (typeof LOSS_SEEN)[number]['code'];
export type LossCause = (typeof LOSS_CAUSES)[number]['code'];
