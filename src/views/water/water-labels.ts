import { PARAMETERS, type Parameter, type ParameterCode } from '@shared/domain/units.ts';
import type { ReservoirState } from '@shared/contracts/reservoirs.ts';
import type { BandState } from '@shared/contracts/water.ts';
import type { Tone } from '@/components/tone.ts';
import type { Drift } from '@/views/water/demand-sentence.ts';

export const RESERVOIR_STATE_TAGS: Record<ReservoirState, { word: string; tone: Tone }> = {
  online: { word: 'online', tone: 'kelp' },
  settling: { word: 'settling', tone: 'slate' },
  standby: { word: 'standby', tone: 'plain' },
  spent: { word: 'spent', tone: 'ochre' },
};

export const BAND_TAGS: Record<BandState, { word: string; tone: Tone } | null> = {
  in: { word: 'in band', tone: 'kelp' },
  below: { word: 'below band', tone: 'ochre' },
  above: { word: 'above band', tone: 'ochre' },
  none: null,
};

export const DRIFT_TAGS: Record<Drift, { word: string; tone: Tone }> = {
  unknown: { word: 'not known yet', tone: 'plain' },
  holds: { word: 'holds', tone: 'kelp' },
  'may slip': { word: 'may slip', tone: 'plain' },
  'may rise': { word: 'may rise', tone: 'plain' },
  slips: { word: 'slips', tone: 'ochre' },
  rises: { word: 'rises', tone: 'ochre' },
};

const BY_CODE = new Map(PARAMETERS.map((parameter) => [parameter.code, parameter]));

export function parameterOf(code: ParameterCode): Parameter {
  const parameter = BY_CODE.get(code);
  if (!parameter) throw new Error(`No parameter ${code}.`);
  return parameter;
}
