import { appendFileSync, existsSync, mkdtempSync, readFileSync, readlinkSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { cuspline } from './run-cli.js';
import { descriptor, writeSmallLibrary } from './small-library.js';

// Each test starts whole processes, several in a row.
vi.setConfig({ testTimeout: 60_000 });

const FIVE = ['amberite', 'borline', 'corvane', 'dulcite', 'elmine'];

let folder: string;
let sources: string;
let out: string;

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'cuspline-cli-'));
  sources = join(folder, 'sources');
  out = join(folder, 'out');
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const night = (...more: string[]) =>
  cuspline('nightly', '--sources', sources, '--out', out, '--date', '2026-01-01', ...more);
const current = () => readlinkSync(join(out, 'current'));
const published = (table: string) => readFileSync(join(out, 'current', `${table}.csv`), 'utf8');

describe('nightly', () => {
  it('publishes a clean library with status 0, says where, and cautions', () => {
    writeSmallLibrary(sources, FIVE);
    const { status, stdout } = night();
    expect(stdout).toContain('5 substances: 5 cleared, 0 flagged, 0 withheld');
    expect(stdout).toMatch(/Release [0-9a-f]{12} is in .*out\/releases/);
    expect(stdout).toMatch(/not to be replaced unseen/);
    expect(status).toBe(0);
    expect(current()).toMatch(/^releases\/[0-9a-f]{12}$/);
    for (const id of FIVE) expect(published('functions')).toContain(`\n${id},cr,`);
  });

  it('names the table file that is missing where its one substance has no other', () => {
    writeSmallLibrary(sources, ['amberite']);
    rmSync(join(sources, 'made-tables', 'points.csv'));
    const { stdout } = cuspline('check', '--sources', sources);
    expect(stdout).toContain('points.csv');
    expect(stdout).not.toContain('broke down');
  });

  it('withholds a substance with a slip and names its cell, what it says and what it should say', () => {
    writeSmallLibrary(sources, FIVE, { entropy: ['corvane'] });
    const { status, stdout } = night();
    expect(stdout).toContain('5 substances: 4 cleared, 0 flagged, 1 withheld');
    expect(stdout).toMatch(/corvane {2}made-tables\/points\.csv:48 S says 84\.\d+, probably 74\.\d+/);
    expect(status).toBe(0);
    expect(published('functions')).not.toContain('corvane');
    expect(published('findings')).toContain('corvane');
  });

  it('ends with 3 under --strict when something is withheld, and with 0 when nothing is', () => {
    writeSmallLibrary(sources, FIVE, { entropy: ['corvane'] });
    expect(night('--strict').status).toBe(3);
    expect(night('--strict', '--only', 'amberite', '--accept-losses').status).toBe(0);
  });

  it('ends with 1 when nothing can be published, and the old release stands', () => {
    writeSmallLibrary(sources, ['amberite']);
    expect(night().status).toBe(0);
    const before = current();
    writeSmallLibrary(sources, ['amberite'], { entropy: ['amberite'] });
    const { status, stdout } = night();
    expect(stdout).toMatch(
      /Nothing could be published: every substance is withheld\. Release [0-9a-f]{12} still stands/,
    );
    expect(status).toBe(1);
    expect(current()).toBe(before);
  });

  it('is held back with 4 when too much would be lost, and --accept-losses publishes it', () => {
    writeSmallLibrary(sources, FIVE);
    night();
    const before = current();
    writeSmallLibrary(sources, FIVE, { entropy: ['amberite', 'borline', 'corvane'] });
    const held = night();
    expect(held.stdout).toContain('Held back: 3 of 5 substances that are cleared now would be withheld.');
    expect(held.status).toBe(4);
    expect(current()).toBe(before);
    const accepted = night('--accept-losses');
    expect(accepted.stdout).toContain('Cleared before and withheld now: amberite, borline, corvane.');
    expect(accepted.status).toBe(0);
    expect(current()).not.toBe(before);
  });

  it('limited by --only does not take the place of a larger release', () => {
    writeSmallLibrary(sources, FIVE);
    night();
    const before = current();
    const { status, stdout } = night('--only', 'dulcite');
    expect(stdout).toContain('the run was limited by --only, and 4 published substances would be missing');
    expect(status).toBe(4);
    expect(current()).toBe(before);
  });

  it('withholds a substance that no table has a row for, so that it does not vanish', () => {
    writeSmallLibrary(sources, FIVE, { empty: ['fenlite'] });
    const { status, stdout } = night();
    expect(stdout).toMatch(/fenlite {2}Nothing was read for fenlite; expected was at least one row/);
    expect(status).toBe(0);
    expect(published('substances')).toMatch(/\nfenlite,.*,withheld,/);
  });

  it('publishes the others when a row cannot be read, and names its line and column', () => {
    writeSmallLibrary(sources, FIVE);
    const file = join(sources, 'made-tables', 'points.csv');
    writeFileSync(file, readFileSync(file, 'utf8').replace(/^(borline,cr,400\.00,)[\d.]+/m, '$14O.1'));
    const { status, stdout } = night();
    expect(stdout).toContain('5 substances: 4 cleared, 0 flagged, 1 withheld');
    expect(stdout).toMatch(/borline {2}“4O\.1” is not a number[\s\S]*made-tables\/points\.csv line 28, column Cp/);
    expect(status).toBe(0);
  });

  it('publishes the others when a descriptor is broken, and says where it breaks', () => {
    writeSmallLibrary(sources, FIVE);
    const broken = join(sources, 'other');
    writeSmallLibrary(broken, ['elmine']);
    rmSync(join(broken, 'substances.csv'));
    writeFileSync(join(broken, 'source.json'), JSON.stringify(descriptor(), null, 2).slice(0, -20));
    const { status, stdout } = night();
    expect(stdout).toMatch(/^Sources\n {2}The descriptor is not JSON/m);
    expect(stdout).toMatch(/other\/source\.json line \d+/);
    expect(status).toBe(0);
  });

  it.each([
    ['an unknown substance', ['--only', 'amberit'], 2, /There is no substance "amberit".*\nDid you mean amberite\?/],
    ['a policy that is not there', ['--policy', 'nowhere.json'], 2, /nowhere\.json cannot be read/],
    ['an unknown option', ['--quick'], 2, /no option --quick/],
  ])('ends with 2 for %s and says what to do', (_what, words, wanted, message) => {
    writeSmallLibrary(sources, ['amberite']);
    const { status, stderr } = night(...words);
    expect(stderr).toMatch(message);
    expect(status).toBe(wanted);
  });

  it('ends with 1 where there are no sources, or no list of substances', () => {
    expect(night()).toMatchObject({ status: 1, stderr: expect.stringMatching(/cannot be read.*\n.*--sources/) });
    writeSmallLibrary(sources, ['amberite']);
    rmSync(join(sources, 'substances.csv'));
    expect(night()).toMatchObject({ status: 1, stderr: expect.stringMatching(/No substance could be read/) });
    expect(existsSync(join(out, 'current'))).toBe(false);
  });

  it('names a wrong key of the policy and the nearest right one', () => {
    writeSmallLibrary(sources, ['amberite']);
    writeFileSync(join(sources, 'policy.json'), '{ "material": { "entropyRelativ": 0.1 }, "pressurePa": -1 }');
    const { status, stderr } = night();
    expect(stderr).toMatch(/material\.entropyRelativ is no key of the policy\. Did you mean entropyRelative/);
    expect(stderr).toMatch(/pressurePa: /);
    expect(status).toBe(1);
  });

  it('with --log json prints one JSON object a line, the summary last, and nothing else', () => {
    writeSmallLibrary(sources, FIVE, { entropy: ['corvane'] });
    const { status, stdout, stderr } = night('--log', 'json');
    const events = stdout
      .trimEnd()
      .split('\n')
      .map((line) => JSON.parse(line));
    expect(stderr).toBe('');
    expect(events.map(({ event }) => event)).toContain('stage-ends');
    expect(events.at(-1)).toMatchObject({
      event: 'summary',
      outcome: 'published',
      status: 0,
      cleared: 4,
      withheld: 1,
      withheldSubstances: [{ substance: 'corvane', verdict: 'withheld' }],
    });
    expect(status).toBe(0);
  });

  it('gives wrong use as JSON too when that was asked for', () => {
    const { status, stdout } = cuspline('nightly', '--log=json', '--jobs', 'many');
    expect(JSON.parse(stdout)).toMatchObject({ event: 'error', status: 2 });
    expect(status).toBe(2);
  });
});

describe('check', () => {
  it('prints the units, each finding with its cell and the suspects, and writes nothing', () => {
    writeSmallLibrary(sources, FIVE, { entropy: ['corvane'] });
    const { status, stdout } = cuspline('check', '--sources', sources);
    expect(stdout).toMatch(/made-tables {2}Cp +heat-capacity +J\/\(mol\.K\) +× 1 +J\/\(mol\.K\)/);
    expect(stdout).toMatch(/corvane {2}fault {2}entropy-follows-heat-capacity {2}made-tables\/points\.csv:48 S/);
    expect(stdout).toMatch(/suspect: made-tables\/points\.csv:48 S says/);
    expect(stdout).toContain('Nothing was written.');
    expect(status).toBe(0);
    expect(cuspline('check', '--sources', sources, '--strict').status).toBe(3);
    expect(existsSync(out)).toBe(false);
  });

  it('gives findings as JSON with their sentence', () => {
    writeSmallLibrary(sources, FIVE, { entropy: ['corvane'] });
    const { stdout } = cuspline('check', '--sources', sources, '--log', 'json');
    const findings = stdout
      .trimEnd()
      .split('\n')
      .map((line) => JSON.parse(line))
      .filter(({ event }) => event === 'finding');
    expect(findings[0]).toMatchObject({
      substance: 'corvane',
      severity: 'fault',
      message: expect.stringMatching(/^S of cr at 400 K/),
    });
  });
});

describe('show', () => {
  it('prints phases, transitions, findings and a sketch in 80 columns', () => {
    writeSmallLibrary(sources, FIVE);
    const { status, stdout } = cuspline('show', 'borline', '--sources', sources, '--pressure', '1 atm');
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    expect(stdout).toMatch(/^borline made up \(borline\), no formula, 100 g\/mol: cleared/);
    expect(stdout).toMatch(/cr → l +500 +500\.0\d* ± /);
    expect(stdout).toMatch(/G against T at 101325 Pa/);
    expect(stdout).toMatch(/┤a+l+$/m);
    expect(status).toBe(0);
  });

  it('refuses a substance that is none and a pressure that is none', () => {
    writeSmallLibrary(sources, FIVE);
    const unknown = cuspline('show', 'borlin', '--sources', sources);
    expect(unknown).toMatchObject({ status: 2, stderr: expect.stringMatching(/Did you mean borline\?/) });
    expect(cuspline('show', 'borline', '--sources', sources, '--pressure', '1 mile').status).toBe(2);
  });
});

describe('verify', () => {
  it('ends with 0 for a whole release, 1 for a damaged one, 2 for none', () => {
    writeSmallLibrary(sources, ['amberite']);
    night();
    expect(cuspline('verify', 'current', '--out', out)).toMatchObject({
      status: 0,
      stdout: expect.stringMatching(/is whole/),
    });
    appendFileSync(join(out, 'current', 'functions.csv'), 'x\n');
    const damaged = cuspline('verify', 'current', '--out', out);
    expect(damaged.stdout).toMatch(/functions\.csv: /);
    expect(damaged.status).toBe(1);
    expect(cuspline('verify', 'other', '--out', out).status).toBe(2);
  });
});

describe('rules, help and version', () => {
  it('are printed with status 0', () => {
    expect(cuspline('rules')).toMatchObject({ status: 0, stdout: expect.stringMatching(/gibbs-continuous/) });
    expect(cuspline('rules', 'gibbs-continuous').stdout).toMatch(/G_from\(Tt, p\) = G_to\(Tt, p\)/);
    expect(cuspline()).toMatchObject({ status: 0, stdout: expect.stringMatching(/Usage: cuspline COMMAND/) });
    expect(cuspline('nightly', '--help').stdout).toMatch(/Examples:/);
    expect(cuspline('--version').stdout).toMatch(/^cuspline \d+\.\d+\.\d+\n$/);
  });

  it('refuse a rule that is none with the nearest', () => {
    expect(cuspline('rules', 'gibs-continuous')).toMatchObject({
      status: 2,
      stderr: expect.stringMatching(/Did you mean gibbs-continuous\?/),
    });
  });
});
