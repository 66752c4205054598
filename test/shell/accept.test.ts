import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { accept } from '../../pipeline/shell/accept-command.js';
import { Stop } from '../../pipeline/shell/exit-status.js';
import { acceptedSchema } from '../../schemas/accepted.js';
import { asked, demoCopy, judged, recorder, rootOf, SLIPS, TODAY } from './demo-copy.js';

vi.setConfig({ testTimeout: 30_000 });

let sources: string;
beforeEach(() => {
  sources = demoCopy();
});
afterEach(() => rmSync(dirname(sources), { recursive: true, force: true }));

const TERMS = ['--reason', 'new sample on its way', '--by', 'A. Curator', '--until', '2026-06-30'];
const run = async (...words: string[]) => {
  const log = recorder();
  const status = await accept(asked(sources, 'accept', ...words), log);
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
const entries = () => acceptedSchema.parse(JSON.parse(readFileSync(join(sources, 'accepted.json'), 'utf8')));
const lapse = (substance: string, date: string) =>
  judged(sources, substance, date).findings.find(
    ({ detail }) => detail.code === 'reading' && detail.problem === 'acceptance-lapsed',
  );

describe('an accepted finding', () => {
  it.each(SLIPS.map(({ medium }) => medium))('of %s no longer withholds it', async (medium) => {
    const id = rootOf(sources, medium);
    const { status, text, events } = await run(id.slice(0, 8), ...TERMS);
    expect(status).toBe(0);
    expect(text).toMatch(/verdict +withheld +cleared/);
    expect(text).toContain('From the next night the substance is cleared; it was withheld.');
    expect(events[0]).toMatchObject({ written: true, verdictAfter: 'cleared', lapses: '2026-07-01' });
    expect(judged(sources, medium).verdict).toBe('cleared');
    expect(judged(sources, medium).findings.find((one) => one.id === id)!.accepted).toBe(true);
  });

  it('holds on its last day and lapses on the next, with a note that says so', async () => {
    await run(rootOf(sources, 'grendite'), ...TERMS);
    expect(judged(sources, 'grendite', '2026-06-30').verdict).toBe('cleared');
    expect(lapse('grendite', '2026-06-30')).toBeUndefined();
    expect(judged(sources, 'grendite', '2026-07-01').verdict).toBe('withheld');
    expect(lapse('grendite', '2026-07-01')!.severity).toBe('note');
  });

  it('does not hold before its own date', async () => {
    const id = rootOf(sources, 'grendite');
    expect((await run(id, ...TERMS, '--date', '2026-05-01')).status).toBe(0);
    expect(entries()[0]!.date).toBe('2026-05-01');
    expect(judged(sources, 'grendite', '2026-04-30').verdict).toBe('withheld');
    expect(judged(sources, 'grendite', '2026-05-01').verdict).toBe('cleared');
  });

  it('lapses when a printed cell behind it changes', async () => {
    const id = rootOf(sources, 'grendite');
    await run(id, ...TERMS);
    const table = join(sources, 'quay-tables/tables/grendite.csv');
    const text = readFileSync(table, 'utf8');
    expect(text).toContain('182.027');
    writeFileSync(table, text.replace('182.027', '182.072'));
    const { verdict, findings } = judged(sources, 'grendite');
    expect(findings.some((one) => one.id === id && !one.accepted)).toBe(true);
    expect(verdict).toBe('withheld');
    expect(lapse('grendite', TODAY)).toBeDefined();
  });

  it('is accepted anew in the place of the older entry, and others keep theirs', async () => {
    const id = rootOf(sources, 'grendite');
    await run(rootOf(sources, 'lumerite'), ...TERMS);
    await run(id, ...TERMS);
    const { text } = await run(id, '--reason', 'still waiting', '--by', 'B. Reader', '--until', '2027-01-31');
    expect(text).toContain('in the place of 1 older entry');
    expect(entries()).toHaveLength(2);
    expect(entries().find(({ finding }) => finding === id)).toMatchObject({ by: 'B. Reader', until: '2027-01-31' });
  });

  it('that follows from another does not clear the substance, and the words say so', async () => {
    const follower = judged(sources, 'lumerite').findings.find(({ cause }) => cause !== null)!;
    const { text } = await run(follower.id, ...TERMS);
    expect(text).toContain('Other findings still withhold the substance');
    expect(judged(sources, 'lumerite').verdict).toBe('withheld');
  });
});

describe('what cannot be accepted is refused, and nothing is written:', () => {
  afterEach(() => expect(existsSync(join(sources, 'accepted.json'))).toBe(false));

  it('an end in the past', async () => {
    const stop = await refusal('abc', '--reason', 'x', '--by', 'y', '--until', '2026-03-30');
    expect(stop.status).toBe(2);
    expect(stop.message).toMatch(/--until is 2026-03-30, and that is before 2026-03-31/);
  });

  it('an entry without reason, name or end', async () => {
    const stop = await refusal('abc', '--reason', ' ', '--until', '2026-05-01');
    expect(stop.status).toBe(2);
    expect(stop.message).toBe('An acceptance needs --reason, --by.');
  });

  it('an id that no finding has', async () => {
    const id = rootOf(sources, 'grendite');
    const stop = await refusal(`${id.slice(0, 14)}zz`, ...TERMS);
    expect(stop.status).toBe(2);
    expect(stop.next).toContain(id);
    expect(stop.next).toContain('"cuspline accept" alone lists the findings');
  });

  it('a finding that belongs to a source alone', async () => {
    const path = join(sources, 'quay-tables', 'corrections.json');
    writeFileSync(path, '[ { "file": "nowhere.csv" } ]');
    const listed = recorder();
    const { findAll } = await import('../../pipeline/shell/find-finding.js');
    const { findings } = await findAll(asked(sources, 'accept'), listed);
    const general = findings.find(({ substance }) => substance === '')!;
    expect((await refusal(general.id, ...TERMS)).message).toContain('belongs to no substance');
  });
});

it('an accepted.json that is no list is left alone', async () => {
  const path = join(sources, 'accepted.json');
  const id = rootOf(sources, 'grendite');
  writeFileSync(path, '{}');
  expect((await refusal(id, ...TERMS)).message).toMatch(/accepted\.json cannot be added to/);
  expect(readFileSync(path, 'utf8')).toBe('{}');
});
