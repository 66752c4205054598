import { RULES, type RuleName } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import { EXIT, Stop } from './exit-status.js';
import { didYouMean } from './nearest.js';
import { RULE_PAGES } from './rules-pages.js';
import { table, wrap } from './text.js';

const WIDTH = 80;

/** Every rule in one line, by group; or one rule in full. Throws a `Stop` where there is no such rule. */
export function rulesInWords(name: string | null, policy: Policy): string[] {
  if (name === null) return list();
  if (!isRule(name)) {
    throw new Stop(
      `There is no rule "${name}".`,
      `${didYouMean(name, RULES)} "cuspline rules" lists them all.`.trim(),
      EXIT.usage,
    );
  }
  return page(name, policy);
}

export function isRule(name: string): name is RuleName {
  return (RULES as readonly string[]).includes(name);
}

function list(): string[] {
  const groups = [...new Set(RULES.map((rule) => RULE_PAGES[rule].group))];
  const width = Math.max(...RULES.map((rule) => rule.length)) + 2;
  return [
    ...groups.flatMap((group) => [
      group,
      ...RULES.filter((rule) => RULE_PAGES[rule].group === group).flatMap((rule) =>
        wrap(RULE_PAGES[rule].holds, WIDTH - width - 2).map(
          (line, i) => `  ${(i === 0 ? rule : '').padEnd(width)}${line}`,
        ),
      ),
      '',
    ]),
    'cuspline rules RULE explains one.',
  ];
}

function page(rule: RuleName, policy: Policy): string[] {
  const { group, holds, formula, tolerance, agrees, disagrees, untestable, wants } = RULE_PAGES[rule];
  const parts: [string, string][] = [
    ['Formula', formula],
    ['Tolerance', tolerance(policy)],
    ['Agrees', agrees],
    ['Disagrees', disagrees],
    ['Untestable', untestable],
    ['To test it', wants],
  ];
  return [
    ...wrap(`${rule} (${group}): ${holds}`, WIDTH),
    '',
    ...table(parts.flatMap(([name, text]) => wrap(text, WIDTH - 14).map((line, i) => [i === 0 ? name : '', line]))),
  ];
}
