import type { Request } from './arguments.js';
import { EXIT, type ExitStatus } from './exit-status.js';
import type { Log } from './log.js';
import { readPolicy } from './policy-file.js';
import { isRule, rulesInWords } from './rules.js';
import { RULE_PAGES } from './rules-pages.js';

/** `cuspline rules [RULE]`. */
export async function rules(request: Request, log: Log): Promise<ExitStatus> {
  const { policy } = readPolicy(request.policy, null);
  const lines = rulesInWords(request.operand, policy);
  const named = Object.entries(RULE_PAGES).filter(([rule]) => request.operand === null || rule === request.operand);
  log.tell(
    {
      event: 'rules',
      rules: named.map(([rule, { tolerance, ...page }]) => ({
        rule,
        ...page,
        tolerance: isRule(rule) ? tolerance(policy) : '',
      })),
    },
    lines,
  );
  return EXIT.done;
}
