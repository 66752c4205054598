import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { correct } from '../../pipeline/shell/correct-command.js';
import { Stop } from '../../pipeline/shell/exit-status.js';
import { correctionsSchema } from '../../schemas/corrections.js';
import { asked, demoCopy, judged, recorder, rootOf, SLIPS, TODAY } from './demo-copy.js';

vi.setConfig({ testTimeout: 30_000 });

let sources: string;
beforeEach(() => {
  sources = demoCopy();
});
afterEach(() => rmSync(dirname(sources), { recursive: true, force: true }));

const entriesOf = (source: string) =>
  correctionsSchema.parse(JSON.parse(readFileSync(join(sources, source, 'corrections.json'), 'utf8')));
const run = async (...words: string[]) => {
  const log = recorder();
  const status = await correct(asked(sources, 'correct', ...words), log, null);
  return { status, text: log.text(), events: log.events };
};
const refusal = async (...words: string[]): Promise<Stop> => {
  const error = await run(...words).then(
    () => null,
    (thrown: unknown) => thrown,
  );
  if (error instanceof Stop) return error;
  throw error ?? new Error(`"${words.join(' ')}" was not refused`);
};
const edit = (file: string, from: string, to: string) => {
  const path = join(sources, file);
  const text = readFileSync(path, 'utf8');
  expect(text).toContain(from);
  writeFileSync(path, text.replace(from, to));
};

describe('correcting a planted slip', () => {
  it.each(SLIPS.map((slip) => [slip.medium, slip.about, slip] as const))(
    'clears %s (%s)',
    async (medium, _about, slip) => {
      const raw = readFileSync(join(sources, slip.source, slip.file));
      const { status, text } = await run(rootOf(sources, medium).slice(0, 8), '--yes', '--by', 'A. Curator');
      expect(status).toBe(0);
      expect(text).toMatch(/verdict +withheld +cleared/);
      expect(judged(sources, medium).verdict).toBe('cleared');
      const entry = entriesOf(slip.source).at(-1)!;
      const { file, line, column, printed } = slip;
      expect(entry).toMatchObject({ file, line, column, printed, who: 'A. Curator', date: TODAY });
      expect(readFileSync(join(sources, slip.source, slip.file)).equals(raw)).toBe(true);
    },
  );

  it('leaves no draft behind, and what stood in the file keeps its bytes', async () => {
    const path = join(sources, 'grey-binder', 'corrections.json');
    const before = readFileSync(path, 'utf8');
    await run(rootOf(sources, 'lumerite'), '--yes');
    const after = readFileSync(path, 'utf8');
    expect(after.startsWith(before.trimEnd().replace(/\n\]$/, ','))).toBe(true);
    expect(after).toMatch(/\n {2}\{\n {4}"file": "melting-and-boiling\.tsv",\n/);
    expect(entriesOf('grey-binder')).toHaveLength(2);
    expect(readdirSync(dirname(path)).filter((name) => name.startsWith('.'))).toEqual([]);
  });

  it('prefers the value that closes the system where the explained one has too few digits', async () => {
    const { text } = await run(rootOf(sources, 'jorvalite'), '--yes');
    expect(text).toContain('With -373.907 the substance would be flagged');
    const entry = entriesOf('quay-tables')[0]!;
    expect(entry.corrected).toBe('-373.909');
    expect(entry.reason).toMatch(/^says -89\.366, probably -373\.907 .*; the system closes at -373\.909; finding/);
  });

  it('takes the value, the reason and the name that are given', async () => {
    const words = ['--value', '598.61', '--reason', 'the second printing has it', '--by', 'B. Reader', '--yes'];
    await run(rootOf(sources, 'lumerite'), ...words);
    expect(entriesOf('grey-binder').at(-1)).toMatchObject({
      corrected: '598.61',
      reason: 'the second printing has it',
      who: 'B. Reader',
    });
    expect(judged(sources, 'lumerite').verdict).toBe('cleared');
  });
});

describe('without a confirmation', () => {
  it('nothing is written; the change is shown, and the command that would write it', async () => {
    const id = rootOf(sources, 'grendite');
    const { status, text, events } = await run(id, '--reason', 'page 12');
    expect(status).toBe(1);
    expect(existsSync(join(sources, 'quay-tables', 'corrections.json'))).toBe(false);
    expect(text).toContain('printed    182.027');
    expect(text).toContain('corrected  180.227');
    expect(text).toMatch(/findings +1 fault +none/);
    expect(text).toContain(`cuspline correct ${id} --reason 'page 12' --sources ${sources} --yes`);
    expect(events[0]).toMatchObject({ event: 'correction', written: false, after: { verdict: 'cleared' } });
  });

  it('a person is asked, and no means no', async () => {
    const id = rootOf(sources, 'grendite');
    const ask = vi.fn(async () => false);
    expect(await correct(asked(sources, 'correct', id), recorder(), ask)).toBe(1);
    expect(ask).toHaveBeenCalledWith(expect.stringContaining('corrections.json'));
    expect(existsSync(join(sources, 'quay-tables', 'corrections.json'))).toBe(false);
    expect(await correct(asked(sources, 'correct', id), recorder(), async () => true)).toBe(0);
    expect(entriesOf('quay-tables')).toHaveLength(1);
  });

  it('the findings are listed with their ids when none is named', async () => {
    const { status, text, events } = await run();
    expect(status).toBe(0);
    for (const { medium } of SLIPS) expect(text).toContain(`${rootOf(sources, medium)}  ${medium}  fault`);
    expect(events[0]!.findings).toHaveLength(8);
  });
});

describe('cells that the data cannot tell apart', () => {
  it('are numbered, and the second can be corrected instead of the first', async () => {
    edit('quay-tables/formation.csv', '-827.037', '-820.637');
    const { text, events } = await run(rootOf(sources, 'wexide'));
    const { suspects } = events[0] as unknown as {
      suspects: { group: number; proposedPrinted: string; address: object }[];
    };
    expect(suspects.filter(({ group }) => group === 1).length).toBeGreaterThan(1);
    expect(text).toMatch(/> 1 {2}quay-tables.*\n {2}2 {2}quay-tables/);
    expect(text).toMatch(/The data cannot tell the others? .*of its group from it: 2/);
    expect((await run(rootOf(sources, 'wexide'), '--suspect', '2', '--yes')).status).toBe(0);
    expect(entriesOf('quay-tables')[0]).toMatchObject({ corrected: suspects[1]!.proposedPrinted });
    expect(judged(sources, 'wexide').verdict).toBe('cleared');
  });
});

describe('what cannot be corrected is refused, with what to do instead:', () => {
  it('an id that no finding has, with the nearest', async () => {
    const id = rootOf(sources, 'grendite');
    const stop = await refusal(`${id.slice(0, 14)}zz`);
    expect(stop.status).toBe(2);
    expect(stop.next).toContain(id);
    expect(stop.next).toMatch(/alone lists the findings.*cuspline check/);
  });

  it('a beginning that several ids share', async () => {
    const findings = judged(sources, 'lumerite').findings;
    const stop = await refusal('');
    expect(findings.length).toBeGreaterThan(1);
    expect(stop.message).toMatch(/findings begin with/);
    expect(stop.status).toBe(2);
  });

  it('a cell that has a correction already', async () => {
    const id = rootOf(sources, 'grendite');
    await run(id, '--value', '181.000', '--yes', '--by', 'A. Curator');
    const again = rootOf(sources, 'grendite');
    expect(again).toBe(id);
    const stop = await refusal(id, '--yes');
    expect(stop.message).toBe(`That cell has a correction already, by A. Curator on ${TODAY}: 182.027 became 181.000.`);
    expect(stop.next).toContain('Edit entry 1 of');
    expect(entriesOf('quay-tables')).toHaveLength(1);
  });

  it('a finding that follows from another, whose id is named', async () => {
    const { findings } = judged(sources, 'lumerite');
    const follower = findings.find(({ cause }) => cause !== null)!;
    expect((await refusal(follower.id)).next).toBe(`Run cuspline correct ${follower.cause}.`);
  });

  it('a finding without suspects', async () => {
    edit('quay-tables/transitions.csv', '1.2346', 'about 12');
    const finding = judged(sources, 'hollmerite').findings.find(({ rule }) => rule === 'row-readable')!;
    expect((await refusal(finding.id)).message).toMatch(/names no suspect cell/);
  });

  it('a value that cannot be read, and a suspect that is not there', async () => {
    const id = rootOf(sources, 'pellanol');
    const unreadable = await refusal(id, '--value', '219.2', '--yes');
    expect(unreadable.message).toMatch(/"219\.2" cannot be read there; expected was a number .* decimal ","/);
    const absent = await refusal(id, '--suspect', '9', '--yes');
    expect(absent.message).toBe('There is no suspect 9; the finding has 1.');
    expect(existsSync(join(sources, 'bench-two', 'corrections.json'))).toBe(false);
  });

  it('a corrections file that is no list', async () => {
    writeFileSync(join(sources, 'quay-tables', 'corrections.json'), '{ "file": "x" }');
    const stop = await refusal(rootOf(sources, 'grendite'), '--yes');
    expect(stop.message).toMatch(/corrections\.json cannot be added to: it holds no list/);
  });
});
