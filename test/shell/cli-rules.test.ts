import { describe, expect, it } from 'vitest';
import { Stop } from '../../pipeline/shell/exit-status.js';
import { rulesInWords } from '../../pipeline/shell/rules.js';
import { RULES } from '../../schemas/finding.js';
import { policySchema } from '../../schemas/policy.js';

const policy = policySchema.parse({});

describe('cuspline rules', () => {
  it('lists every rule that exists', () => {
    const text = rulesInWords(null, policy).join('\n');
    for (const rule of RULES) expect(text).toContain(`  ${rule} `);
  });

  it.each(RULES)('explains %s with formula, tolerance, outcomes and what it wants', (rule) => {
    const lines = rulesInWords(rule, policy);
    const heads = lines.map((line) => /^(\w[\w ]*?) {2}/.exec(line)?.[1]).filter((head) => head !== undefined);
    expect(heads).toEqual(['Formula', 'Tolerance', 'Agrees', 'Disagrees', 'Untestable', 'To test it']);
    for (const line of lines) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('prints the tolerances of the policy in force', () => {
    const strict = policySchema.parse({ material: { transitionTemperatureK: 0.125 } });
    expect(rulesInWords('crossing-agrees', strict).join(' ')).toContain('0.125 K');
    expect(rulesInWords('crossing-agrees', policy).join(' ')).toContain('0.5 K');
  });

  it('refuses a name that is none, with the nearest, as wrong use', () => {
    expect(() => rulesInWords('gibs-continuous', policy)).toThrow(Stop);
    try {
      rulesInWords('gibs-continuous', policy);
    } catch (error) {
      expect(error).toMatchObject({ status: 2, next: expect.stringContaining('gibbs-continuous') });
    }
  });
});
