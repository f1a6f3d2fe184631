import type { MixingCard, Reservoir } from '../../../shared/contracts/reservoirs.ts';
import { dayOf } from '../../../shared/domain/days.ts';
import {
  type LimewaterResult,
  mixLimewater,
  USUAL_ACID_PERCENT,
  USUAL_LIME_PURITY,
} from '../../../shared/domain/limewater.ts';
import {
  MIXING_CAUTIONS,
  mixingSteps,
  SPOON_ERROR,
  spoonWords,
  type AmountWords,
} from '../../../shared/domain/mixing-steps.ts';
import type { Db } from '../../db/client.ts';
import type { FileAnswer } from '../../file-answer.ts';
import { farmOf } from '../../queries/farm.ts';
import { limewaterHabits } from '../../queries/limewater-habits.ts';
import { showReservoir } from '../../queries/reservoirs.ts';
import { listWaterItems } from '../../queries/water-items.ts';
import { MARGIN, Paper, RIGHT } from './paper.ts';

const WIDTH = RIGHT - MARGIN;
const BOX = 12;
const COLUMN = WIDTH / 4;

const WORDS: AmountWords = {
  litres: (amount) => `${shortest(amount, 1)} L`,
  grams: (amount) => `${shortest(amount, 1)} g`,
  millilitres: (amount) => `${shortest(amount, 0)} mL`,
};

/**
 * The card that hangs beside the vessel: what to weigh, the order of work with boxes to tick, and the cautions. One page.
 *
 * @throws {DomainError} `record.not_found`; `domain.out_of_range` for amounts that make no mix
 */
export async function mixingCardFile(db: Db, reservoirId: string, card: MixingCard, now: number): Promise<FileAnswer> {
  const reservoir = showReservoir(db, reservoirId, now);
  const farm = farmOf(db);
  const day = dayOf(now, farm.timeZone);
  const paper = new Paper(`Mixing card ${reservoir.code}`);
  drawHead(paper, { farmName: farm.name, day, reservoir });
  const spoons = spoonWords(card.limeG, limewaterHabits(farm).spoonG);
  drawAmounts(paper, card, spoons);
  drawOutcome(paper, card, mixOf(db, card));
  drawSteps(paper, card, spoons);
  drawCautions(paper);
  drawSignature(paper);
  return {
    fileName: `mixing-card-${reservoir.code}-${day}.pdf`,
    contentType: 'application/pdf',
    content: await paper.finish(`${farm.name}   ·   Limewater is caustic: goggles and gloves.`),
    inline: true,
  };
}

function mixOf(db: Db, card: MixingCard): LimewaterResult {
  const strengthOf = (kind: 'lime' | 'vinegar') => listWaterItems(db).find((item) => item.kind === kind)?.strength;
  return mixLimewater({
    ...card,
    purity: strengthOf('lime') ?? USUAL_LIME_PURITY,
    acidPercent: strengthOf('vinegar') ?? USUAL_ACID_PERCENT,
  });
}

function drawHead(
  paper: Paper,
  { farmName, day, reservoir }: { farmName: string; day: string; reservoir: Reservoir },
): void {
  paper.text(farmName, MARGIN, MARGIN, { size: 17, bold: true });
  paper.textEnd('Mixing card', RIGHT, MARGIN, { size: 17 });
  const systems = reservoir.feeds.map(({ systemCode }) => systemCode).join(', ');
  paper.text(`Reservoir ${reservoir.code}, feeds ${systems}`, MARGIN, MARGIN + 26, { size: 11, bold: true });
  paper.textEnd(day, RIGHT, MARGIN + 26, { size: 11 });
  paper.rule(MARGIN + 48, 1.2);
  paper.y = MARGIN + 60;
}

function drawAmounts(
  paper: Paper,
  { waterL, limeG, vinegarMl, temperatureC }: MixingCard,
  spoons: string | null,
): void {
  const amounts: [string, string][] = [
    ['RO/DI water', WORDS.litres(waterL)],
    ['Lime, weighed', WORDS.grams(limeG)],
    ['Vinegar', vinegarMl > 0 ? WORDS.millilitres(vinegarMl) : 'none'],
    ['Water at', `${shortest(temperatureC, 1)} °C`],
  ];
  amounts.forEach(([label, value], index) => {
    const x = MARGIN + index * COLUMN;
    paper.text(label, x, paper.y, { size: 9, soft: true });
    paper.text(value, x, paper.y + 14, { size: 17, bold: true });
  });
  paper.y += 42;
  if (spoons === null) return;
  const off = `${SPOON_ERROR * 100} %`;
  paper.text(`That is ${spoons} of the farm’s own; a spoon may be off by ${off}, so weigh.`, MARGIN, paper.y, {
    size: 9.5,
  });
  paper.y += 18;
}

function drawOutcome(paper: Paper, { vinegarMl }: MixingCard, mix: LimewaterResult): void {
  const made = `Makes limewater of ${mix.alkalinityMeqL.toFixed(1)} meq/L, ${Math.round(mix.saturation * 100)} % of what this water holds.`;
  const short =
    mix.shortOf === 'lime'
      ? 'More lime would make it stronger.'
      : `${WORDS.grams(mix.undissolvedG)} of lime stay undissolved and settle.`;
  const vinegar =
    vinegarMl === 0
      ? ''
      : mix.vinegarHelps
        ? ' The vinegar dissolves more lime.'
        : ' The vinegar dissolves nothing more here.';
  paper.y += paper.block(`${made} ${short}${vinegar}`, MARGIN, paper.y, WIDTH, { size: 9.5, soft: true }) + 8;
}

function drawSteps(paper: Paper, card: MixingCard, spoons: string | null): void {
  paper.rule(paper.y);
  paper.y += 12;
  mixingSteps(card, WORDS, spoons).forEach(({ text, mind }, index) => {
    paper.doc.rect(MARGIN, paper.y, BOX, BOX).lineWidth(0.8).stroke('#111111');
    const height = paper.block(`${index + 1}.  ${text}`, MARGIN + BOX + 10, paper.y, WIDTH - BOX - 10, {
      size: 11.5,
      bold: true,
    });
    const mindHeight = paper.block(mind, MARGIN + BOX + 27, paper.y + height, WIDTH - BOX - 27, {
      size: 9.5,
      soft: true,
    });
    paper.y += height + mindHeight + 7;
  });
}

function drawCautions(paper: Paper): void {
  paper.y += 2;
  paper.rule(paper.y);
  paper.y += 10;
  paper.text('Caution', MARGIN, paper.y, { size: 11, bold: true });
  paper.y += 17;
  for (const caution of MIXING_CAUTIONS) {
    paper.text('–', MARGIN, paper.y, { size: 9.5 });
    paper.y += paper.block(caution, MARGIN + 12, paper.y, WIDTH - 12, { size: 9.5 }) + 2;
  }
}

function drawSignature(paper: Paper): void {
  paper.y += 20;
  ['Mixed by', 'at', 'clear and ready at'].forEach((label, index) => {
    const x = MARGIN + index * (WIDTH / 3);
    paper.doc
      .moveTo(x, paper.y)
      .lineTo(x + WIDTH / 3 - 14, paper.y)
      .lineWidth(0.5)
      .stroke('#111111');
    paper.text(label, x, paper.y + 4, { size: 8.5, soft: true });
  });
}

/** At most so many decimals, none that are zero. */
function shortest(value: number, decimals: number): string {
  return String(Number(value.toFixed(decimals)));
}
