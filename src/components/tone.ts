export const TONES = ['kelp', 'ochre', 'brick', 'slate', 'plum', 'plain'] as const;

/** kelp: good, ready. ochre: watch. brick: act now. slate: information. plum: the accent. plain: nothing special. */
export type Tone = (typeof TONES)[number];
