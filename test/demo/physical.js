/**
 * Refuses a medium that is not sensible over its whole tabulated range and a tenth beyond it, metastable branches
 * included: Cp > 0, the gas has the least Cp, S(crystal) < S(liquid) < S(gas), each pair of neighbouring phases crosses
 * once and where stated, and nowhere is a phase lowest in G but the stated one, gas imperfection included where
 * critical constants are given.
 */
import { gibbsAt } from './close.js';
import { ATMOSPHERE_PA, heatCapacity, STANDARD_PRESSURE_PA } from './laws.js';

const REACH = 0.1;
const STEP_K = 1;
const GRACE_K = 2;

export function assertPhysical(medium, closed) {
  const fail = (words) => {
    throw new Error(`${medium.id}: ${words}`);
  };
  const order = [medium.steps[0].from, ...medium.steps.map((step) => step.to)];
  const levels = Object.fromEntries(order.map((label) => [label, continued(medium, closed, label)]));
  assertMagnitudes(medium, fail);

  for (let i = 0; i < order.length; i++) {
    const below = levels[order[i]];
    for (let T = below.from; T <= below.to; T += STEP_K) {
      if (!(below.Cp(T) > 0)) fail(`Cp of ${order[i]} is not positive at ${T} K`);
      for (const label of order.slice(i + 1)) {
        const above = levels[label];
        if (T < above.from || T > above.to) continue;
        if (!(above.S(T) > below.S(T))) fail(`S(${label}) is not above S(${order[i]}) at ${T} K`);
        const tabulated = isTabulated(medium, label, T) && isTabulated(medium, order[i], T);
        if (label === 'g' && tabulated && !(above.Cp(T) < below.Cp(T)))
          fail(`Cp of the gas is not below that of ${order[i]} at ${T} K`);
      }
    }
  }

  for (const pressurePa of [STANDARD_PRESSURE_PA, ATMOSPHERE_PA]) {
    assertOrder(medium, order, levels, pressurePa, fail);
  }
  for (const step of closed.steps) {
    const T = step.temperatureK;
    const gap =
      gibbsAt(medium, closed, step.to, T, step.pressurePa ?? STANDARD_PRESSURE_PA, step.gas) -
      gibbsAt(medium, closed, step.from, T, step.pressurePa ?? STANDARD_PRESSURE_PA, step.gas);
    if (Math.abs(gap) > 1e-6) fail(`G is not equal at ${T} K: ${gap} J/mol`);
  }
}

/** Where each phase is lowest, and that neighbours cross once. */
function assertOrder(medium, order, levels, pressurePa, fail) {
  const G = (label, T) => levels[label].G(T, pressurePa, 'real');
  for (let T = 200; T <= 1650; T += STEP_K) {
    const known = order.filter((label) => T >= levels[label].from && T <= levels[label].to);
    if (known.length < 2) continue;
    const lowest = known.reduce((best, label) => (G(label, T) < G(best, T) ? label : best));
    // grace about a step: its own pressure may be 1 atm where 1 bar is looked at
    const stated = order.filter((_, i) => {
      const opens = i === 0 ? 0 : medium.steps[i - 1].temperatureK - GRACE_K;
      const closes = i === order.length - 1 ? Infinity : medium.steps[i].temperatureK + GRACE_K;
      return T >= opens && T <= closes;
    });
    const missing = stated.filter((label) => known.includes(label)).length === 0;
    if (!missing && !stated.includes(lowest))
      fail(`${lowest} is lowest in G at ${T} K, stated is ${stated.join(' or ')}`);
  }
  for (let i = 0; i < order.length; i++) {
    for (let j = i + 1; j < order.length; j++) {
      const from = Math.max(levels[order[i]].from, levels[order[j]].from);
      const to = Math.min(levels[order[i]].to, levels[order[j]].to);
      let crossings = 0;
      let sign = 0;
      for (let T = from; T <= to; T += STEP_K) {
        const now = Math.sign(G(order[j], T) - G(order[i], T));
        if (sign !== 0 && now !== 0 && now !== sign) crossings++;
        if (now !== 0) sign = now;
      }
      const wanted = j === i + 1 ? 1 : null;
      if (wanted === 1 ? crossings !== 1 : crossings > 1) fail(`${order[i]} and ${order[j]} cross ${crossings} times`);
    }
  }
}

const isTabulated = (medium, label, T) => T >= medium.phases[label].rangeK[0] && T <= medium.phases[label].rangeK[1];

/** Richards and Trouton, with room: entropies of fusion 7 to 15 per atom-like unit, of boiling 80 to 110 J/(mol K). */
function assertMagnitudes(medium, fail) {
  for (const step of medium.steps) {
    const [low, high] =
      step.to === 'g' ? [80, 110] : step.to !== 'l' ? [2, 20] : medium.class === 'metal' ? [7, 15] : [15, 130];
    if (step.entropy < low || step.entropy > high)
      fail(`${step.from} to ${step.to}: ${step.entropy} J/(mol K) is unusual`);
  }
}

/** A phase with its last Cp held for a tenth beyond its table, as a nightly run would continue it. */
function continued(medium, closed, label) {
  const { law, rangeK } = medium.phases[label];
  const [low, high] = rangeK;
  const phase = closed.phases[label];
  const inside = (T) => Math.min(Math.max(T, low), high);
  const Cp = (T) => heatCapacity(law, inside(T));
  const H = (T) => phase.H(inside(T)) + Cp(T) * (T - inside(T));
  const S = (T) => phase.S(inside(T)) + Cp(T) * Math.log(T / inside(T));
  const point = (T) => ({ phases: { [label]: { G: () => H(T) - T * S(T) } } });
  return {
    from: low * (1 - REACH),
    to: high * (1 + REACH),
    Cp,
    S,
    G: (T, pressurePa, gas) => gibbsAt(medium, point(T), label, T, pressurePa, gas),
  };
}
