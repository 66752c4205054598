import { setFlagsFromString } from 'node:v8';

/**
 * A night is a few seconds in which every thread runs the same few hundred functions: left to itself the engine spends a
 * third of the processor time on optimising them, again and again. Baseline code at once, optimised code later and with
 * less inlined, took a million rows from 16.5 to 14 s of processor time (Node 20). Results do not depend on it. Must run
 * before the stages are loaded.
 */
for (const flag of ['--always-sparkplug', '--interrupt-budget=400000', '--max-inlined-bytecode-size-cumulative=300']) {
  setFlagsFromString(flag);
}
