import { describe, expect, it } from 'vitest';
import { checked, findingsOf, type Law, laws, medium, outcomeOf, rowsOf, silent, TR, verdictOf } from '../medium.js';

const RULE = 'stated-transition-jumps';
const at400 = (order: string, dH = '', dS = '', from = 'cr', to = 'cr') => {
  const printed = medium();
  printed.transitions[0] = { from, to, T: '400.000', dH, dS, p: '1', order };
  return printed;
};

describe(RULE, () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent where first-order transitions have their jump (%s)', (basis, evidence) => {
    expect(verdictOf(checked(medium(basis)), RULE, 'cr>l')).toEqual(silent(evidence));
    expect(verdictOf(checked(medium(basis)), RULE, 'l>g')).toEqual(silent(evidence));
  });

  it('is silent where a continuous and a glass transition have none', () => {
    expect(verdictOf(checked(at400('continuous')), RULE, 'cr>cr')).toEqual(silent('arithmetic'));
    expect(verdictOf(checked(at400('continuous', '0.000', '0.000')), RULE, 'cr>cr')).toEqual(silent('arithmetic'));
    const { l } = laws();
    const glass: Law = {
      ...l,
      parts: [
        { fromK: 1, cp: () => 45 },
        { fromK: 400, cp: l.parts[0]!.cp },
      ],
    };
    const printed = at400('glass', '', '', 'l', 'l');
    printed.tables.l = rowsOf(glass, [TR, 320, 340, 360, 380, 400, 400, 420, 440, 460, 480, 500, 550, 600]);
    expect(verdictOf(checked(printed), RULE, 'l>l')).toEqual(silent('arithmetic'));
  });

  it('is silent where a continuous transition joins two phases whose curves meet', () => {
    const { cr } = laws();
    const printed = at400('continuous', '', '', 'cr', 'cr-II');
    const above: Law = { ...cr, parts: [{ fromK: 1, cp: (t) => cr.parts[0]!.cp(t) + 0.05 * (t - 400) }] };
    const raised = { ...above };
    printed.tables['cr-II'] = rowsOf(raised, [400, 420, 440, 460, 480, 500]);
    printed.tables = { cr: printed.tables.cr!, 'cr-II': printed.tables['cr-II']! };
    printed.transitions = [printed.transitions[0]!];
    const outcome = outcomeOf(checked(printed), RULE, 'cr>cr-II');
    expect(outcome.outcome).not.toBe('disagrees');
  });

  it.each([
    ['continuous', '2.000'],
    ['glass', '2.000'],
    ['continuous', '-2.000'],
  ])('finds a %s transition that is stated with dS = %s', (order, dS) => {
    const found = checked(at400(order, '', dS));
    const [finding] = findingsOf(found, RULE);
    expect(finding).toMatchObject({ severity: 'fault', observed: Number(dS), expected: 0, unit: 'J/(mol.K)' });
    expect(finding!.detail).toMatchObject({ what: 'jump', statedK: 400 });
    expect(outcomeOf(found, RULE, 'cr>cr')).toMatchObject({ outcome: 'disagrees', evidence: 'arithmetic' });
  });

  it('takes a jump that no one would notice for a doubt', () => {
    expect(findingsOf(checked(at400('continuous', '', '0.010')), RULE).map(({ severity }) => severity)).toEqual([
      'doubt',
    ]);
  });

  it('doubts a first-order transition whose curves have no jump', () => {
    const { cr } = laws();
    const printed = medium();
    printed.tables = {
      cr: printed.tables.cr!,
      'cr-II': rowsOf(cr, [TR, 300, 320, 340, 360, 380, 400, 420, 440, 460, 480, 500]),
    };
    printed.anchors = [printed.anchors[0]!, { ...printed.anchors[0]!, phase: 'cr-II' }];
    printed.transitions = [{ from: 'cr', to: 'cr-II', T: '400.000', dH: '', dS: '', p: '1' }];
    const found = checked(printed);
    const [finding] = findingsOf(found, RULE);
    expect(finding!.severity).toBe('doubt');
    expect(finding!.detail).toMatchObject({ what: 'no-jump' });
    expect(outcomeOf(found, RULE, 'cr>cr-II').outcome).toBe('disagrees');
  });

  it('is untestable where nothing is stated and no curve is there', () => {
    const printed = medium();
    printed.tables = {};
    Object.assign(printed.transitions[0]!, { dH: '', dS: '' });
    const outcome = outcomeOf(checked(printed), RULE, 'cr>l');
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain('table');
  });
});
