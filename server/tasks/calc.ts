import { once } from 'node:events';
import { createInterface } from 'node:readline';
import { CALCULATORS } from '../../shared/domain/calculators/index.ts';
import type { Calculator } from '../../shared/domain/calculators/calculator.ts';
import { DomainError } from '../../shared/errors.ts';

/** The calculations of the screens for scripts: a JSON object a line in, a JSON object a line out, in the same order. */
const name = process.argv[2] ?? '';
const asked = Object.hasOwn(CALCULATORS, name) ? CALCULATORS[name] : undefined;

// Whoever reads the answers may stop early, as `head` does.
process.stdout.on('error', () => process.exit(0));

if (asked) await answerLines(asked);
else {
  const names = Object.entries(CALCULATORS).map(([each, { summary }]) => `  ${each.padEnd(10)} ${summary}`);
  console.error(`Name one of these calculations: npm run -s calc -- NAME\n${names.join('\n')}`);
  process.exitCode = 2;
}

async function answerLines(calculator: Calculator): Promise<void> {
  for await (const line of createInterface({ input: process.stdin, crlfDelay: Infinity })) {
    if (line.trim() === '') continue;
    const isTaken = process.stdout.write(`${JSON.stringify(answer(calculator, line))}\n`);
    if (!isTaken) await once(process.stdout, 'drain');
  }
}

function answer(calculator: Calculator, line: string): Record<string, unknown> {
  try {
    return calculator.run(JSON.parse(line));
  } catch (error) {
    if (error instanceof DomainError) return { error: error.message };
    if (error instanceof SyntaxError) return { error: 'This line is not JSON.' };
    // One line that fails must not take the lines after it along.
    return { error: `This could not be calculated: ${String(error)}` };
  }
}
