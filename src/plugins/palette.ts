/** The colours of the product, by what they mean. Words and shapes carry the same meaning beside them. */
export interface Palette {
  ground: string;
  sheet: string;
  rule: string;
  ruleSoft: string;
  ink: string;
  inkSoft: string;
  spine: string;
  spineInk: string;
  /** The accent on the dark spine, the same in both themes. */
  spinePlum: string;
  onSpinePlum: string;
  plum: string;
  plumWash: string;
  onPlum: string;
  kelp: string;
  kelpWash: string;
  ochre: string;
  ochreWash: string;
  brick: string;
  brickWash: string;
  slate: string;
  slateWash: string;
}

export const lightPalette: Palette = {
  ground: '#F3F5F3',
  sheet: '#FFFFFF',
  rule: '#D3DAD5',
  ruleSoft: '#E6EAE7',
  ink: '#16211E',
  inkSoft: '#4B5955',
  spine: '#1B2B27',
  spineInk: '#DCE5E1',
  spinePlum: '#E694BB',
  onSpinePlum: '#2B101D',
  plum: '#7A2A50',
  plumWash: '#F5E9EF',
  onPlum: '#FFFFFF',
  kelp: '#2B6848',
  kelpWash: '#E6F1EA',
  ochre: '#8F5D0C',
  ochreWash: '#FAF0DC',
  brick: '#A5311F',
  brickWash: '#FBE9E5',
  slate: '#3A5873',
  slateWash: '#E6EDF3',
};

export const darkPalette: Palette = {
  ground: '#0F1614',
  sheet: '#17201E',
  rule: '#2F3B38',
  ruleSoft: '#243029',
  ink: '#E8EDEA',
  inkSoft: '#A8B5B0',
  spine: '#0A100E',
  spineInk: '#C9D4CF',
  spinePlum: '#E694BB',
  onSpinePlum: '#2B101D',
  plum: '#E694BB',
  plumWash: '#3A2230',
  onPlum: '#2B101D',
  kelp: '#84CBA3',
  kelpWash: '#1B3226',
  ochre: '#E5B662',
  ochreWash: '#352A14',
  brick: '#F2907F',
  brickWash: '#3A201B',
  slate: '#A0BDD8',
  slateWash: '#1C2A36',
};
