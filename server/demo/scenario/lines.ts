import type { GrowthFormCode } from '../../../shared/domain/growth.ts';

/** A line of the demo farm. Trade names and their stories are made up. */
export interface LineSpec {
  code: string;
  tradeName: string;
  taxon: string;
  growthForm: GrowthFormCode;
  publicText: string;
  /** What stores pay for a frag, in cents. */
  fragPrice: number;
}

const line = (
  code: string,
  tradeName: string,
  taxon: string,
  growthForm: GrowthFormCode,
  fragPrice: number,
  publicText: string,
): LineSpec => ({ code, tradeName, taxon, growthForm, fragPrice, publicText });

export const LINES: readonly LineSpec[] = [
  line(
    'LAN',
    'Lantern Quay',
    'Acropora tenuis',
    'staghorn',
    2600,
    'Cream branches with violet tips, brightest under evening light.',
  ),
  line(
    'HER',
    'Heron Blue',
    'Acropora millepora',
    'staghorn',
    2900,
    'A dense blue table that keeps its colour in the middle of a tank.',
  ),
  line('KIL', 'Kiln Ember', 'Acropora loripes', 'staghorn', 3100, 'Rust body and orange corallites like coals.'),
  line(
    'FER',
    'Ferry Lights',
    'Acropora valida',
    'staghorn',
    2400,
    'Green base, lilac growing tips, forgiving of beginners.',
  ),
  line('SLA', 'Slate Roof', 'Acropora nana', 'staghorn', 2700, 'Thin grey-blue fingers that sway in strong flow.'),
  line(
    'MIL',
    'Miller’s Green',
    'Acropora yongei',
    'staghorn',
    1900,
    'The fastest of our staghorns, a clear leaf green.',
  ),
  line('COB', 'Cobble Pink', 'Acropora humilis', 'staghorn', 3300, 'Stout pink fingers with pale rims.'),
  line('GAN', 'Gannet', 'Acropora secale', 'staghorn', 2800, 'White polyps over a yellow skeleton.'),
  line('TID', 'Tide Table', 'Acropora hyacinthus', 'staghorn', 2500, 'Grows flat and wide, mint with a rose edge.'),
  line('BUO', 'Buoy Red', 'Acropora microclados', 'staghorn', 3400, 'Strawberry red when fed well.'),
  line('THI', 'Thistle', 'Seriatopora hystrix', 'branching', 1600, 'Needle-fine pink branches. A quick grower.'),
  line('WIC', 'Wicker', 'Seriatopora caliendrum', 'branching', 1500, 'Green baskets that fill a corner in a year.'),
  line(
    'PLU',
    'Plum Orchard',
    'Stylophora pistillata',
    'branching',
    1700,
    'Round plum-coloured heads with long polyps.',
  ),
  line('MOO', 'Mooring', 'Pocillopora damicornis', 'branching', 1400, 'A hardy first stony coral, rose to brown.'),
  line('OAT', 'Oatfield', 'Pocillopora verrucosa', 'branching', 1500, 'Cream warts over a green body.'),
  line('RED', 'Redcap', 'Montipora digitata', 'branching', 1200, 'Orange fingers, good for trying a new tank.'),
  line('MEA', 'Meadow', 'Montipora digitata', 'branching', 1200, 'The green sister of Redcap.'),
  line('WIG', 'Wigeon', 'Montipora confusa', 'plating', 1800, 'Encrusts first, then sends up green knobs.'),
  line('PAN', 'Pantile', 'Montipora capricornis', 'plating', 1500, 'Brick-red whorls like roof tiles.'),
  line('SAI', 'Sailcloth', 'Montipora capricornis', 'plating', 1500, 'Pale lilac plates with a white rim.'),
  line('GRI', 'Grist', 'Montipora hispida', 'plating', 1700, 'Speckled grey and gold.'),
  line('LIC', 'Lichen Wall', 'Leptoseris mycetoseroides', 'plating', 2200, 'Orange ridges for shady places.'),
  line('FOX', 'Foxglove', 'Pavona decussata', 'plating', 1400, 'Upright green leaves, very hardy.'),
  line('EMB', 'Embankment', 'Cyphastrea serailia', 'plating', 2300, 'Blue eyes on a rust crust.'),
  line('HON', 'Honey Stone', 'Favites pentagona', 'massive', 2600, 'Gold rims around green centres.'),
  line('DRY', 'Drystone', 'Goniastrea edwardsi', 'massive', 2400, 'A tight mosaic of grey and teal.'),
  line('BRI', 'Bridge Arch', 'Porites cylindrica', 'branching', 1400, 'Yellow fingers that stand strong flow.'),
  line('CAN', 'Candlemaker', 'Caulastraea furcata', 'branching_lps', 1800, 'Striped green trumpets on long stems.'),
  line('TOR', 'Torchbearer', 'Euphyllia glabrescens', 'branching_lps', 4200, 'Long gold tentacles with violet ends.'),
  line(
    'HAM',
    'Hammer Lane',
    'Fimbriaphyllia paraancora',
    'branching_lps',
    3600,
    'Green hammers that open wide by noon.',
  ),
  line('FRO', 'Frogspring', 'Fimbriaphyllia paradivisa', 'branching_lps', 3400, 'Branching, lime with pink dots.'),
  line(
    'SUN',
    'Sundial',
    'Duncanopsammia axifuga',
    'branching_lps',
    2600,
    'Grey discs with green mouths; eats readily.',
  ),
  line('LOB', 'Lobster Pot', 'Lobophyllia hemprichii', 'fleshy_lps', 3900, 'Crimson flesh with a green ring.'),
  line('MIC', 'Cinder Path', 'Micromussa lordhowensis', 'fleshy_lps', 4400, 'Red and grey eyes, no two alike.'),
  line('BLA', 'Blackberry', 'Blastomussa wellsi', 'fleshy_lps', 3800, 'Deep purple discs for low light.'),
  line('POT', 'Potter’s Wheel', 'Goniopora stokesi', 'flowerpot', 3000, 'Tall pink flowers, fed each day on the farm.'),
  line('ZIN', 'Tin Whistle', 'Zoanthus sociatus', 'zoanthid', 1300, 'Silver skirts and orange mouths.'),
  line('GIN', 'Ginger Row', 'Zoanthus gigantus', 'zoanthid', 1600, 'Large ginger polyps on long stalks.'),
  line('VEL', 'Velvet Hall', 'Rhodactis inchoata', 'mushroom', 1500, 'Blue velvet discs that split on their own.'),
  line('ASH', 'Ash Tree', 'Sinularia flexibilis', 'leather', 1100, 'Soft grey arms that move with every wave.'),
];

/** The line that does badly everywhere. */
export const WEAK_LINE = 'GAN';

const CARE: Partial<Record<GrowthFormCode, string>> = {
  staghorn: 'Strong, changing flow and bright light. Keep alkalinity steady; it shows a swing within days.',
  branching: 'Bright light and good flow. Grows fast, so leave it room.',
  plating: 'Medium light. Keep sand and detritus off the plates with flow from the side.',
  massive: 'Medium light and flow. Grows slowly; let it settle before you move it.',
  branching_lps: 'Moderate light, gentle flow. Feed small meaty food twice a week. Its tentacles sting neighbours.',
  fleshy_lps: 'Low to medium light, gentle flow. Feed after lights out.',
  flowerpot: 'Medium light and gentle flow. Feed fine food often.',
  zoanthid: 'Any light that is not harsh. Wear gloves and glasses: the slime can be poisonous.',
  mushroom: 'Low light, little flow. Place it where it can spread.',
  leather: 'Medium light and flow. It sheds its skin now and then and stays closed for days: leave it alone.',
};

export function careText(form: GrowthFormCode): string {
  return CARE[form] ?? '';
}
