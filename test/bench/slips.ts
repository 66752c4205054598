/**
 * How many planted slips are caught, named and explained, by kind and design:
 *
 *     npm run bench:slips -- [--substances 300] [--rounds 8] [--pair-rounds 2] [--published-rounds 60] [--seed 700001]
 *         [--designs handbook,coarse] [--only published|synthetic] [--misses misses.txt] [--by-design]
 *
 * Seeds below 100 000 are for developing the checks, those from 700 000 report.
 */
import { writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { runPipeline } from '../slips/run-pipeline.js';
import {
  byFamilyAndDesign,
  byKind,
  byKindAndDesign,
  misses,
  rates,
  rateTable,
  slipTable,
} from '../slips/slip-rates.js';
import { type Study, studyPublished, studySynthetic } from '../slips/slip-study.js';
import { DESIGN_NAMES, type DesignName } from '../synthetic/designs.js';

const { values } = parseArgs({
  options: {
    substances: { type: 'string', default: '300' },
    rounds: { type: 'string', default: '8' },
    'pair-rounds': { type: 'string', default: '2' },
    'published-rounds': { type: 'string', default: '60' },
    seed: { type: 'string', default: '700001' },
    designs: { type: 'string' },
    only: { type: 'string' },
    misses: { type: 'string' },
    'by-design': { type: 'boolean', default: false },
  },
});
const firstSeed = Number(values.seed);
const designs = values.designs?.split(',').map((name): DesignName => {
  const known = DESIGN_NAMES.find((one) => one === name);
  if (known === undefined) throw new Error(`no design ${name}; there are ${DESIGN_NAMES.join(', ')}`);
  return known;
});

const missed: string[] = [];
if (values.only !== 'synthetic') {
  const rounds = Number(values['published-rounds']);
  const folders = { published: 'test/published', 'held-out': 'test/held-out' };
  print('Published sets', await studyPublished(folders, runPipeline, { rounds, pairRounds: rounds, firstSeed }));
}
if (values.only !== 'published') {
  const options = { rounds: Number(values.rounds), pairRounds: Number(values['pair-rounds']), firstSeed };
  print('Synthetic substances', await studySynthetic(Number(values.substances), runPipeline, options, designs));
}
if (values.misses !== undefined) writeFileSync(values.misses, `${missed.join('\n')}\n`);

function print(title: string, study: Study): void {
  const { one, two, clean, bystanders, accused } = study;
  console.log(`\n# ${title}\n\n${rateTable(rates(one, two, clean))}`);
  console.log(
    `\nLeft clean beside spoilt ones: ${bystanders}, of which accused ${accused.length} ${accused.join(', ')}`,
  );
  if (clean.accused.length > 0) console.log(`Clean and accused: ${clean.accused.join(', ')}`);
  console.log(`\n## One slip, by kind\n\n${slipTable(one, byKind)}`);
  console.log(`\n## One slip, by design\n\n${slipTable(one, byFamilyAndDesign)}`);
  if (values['by-design']) console.log(`\n## One slip, by kind and design\n\n${slipTable(one, byKindAndDesign)}`);
  console.log(`\n## Two slips in one substance, each\n\n${slipTable(two, byFamilyAndDesign)}`);
  missed.push(`# ${title}`, '## One slip', ...misses(one), '## Two slips', ...misses(two));
}
