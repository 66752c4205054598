import type { Crossing, PhaseCurve } from '../../schemas/curves.js';
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { crossingsOf, gibbsInDiagram } from '../core/physics/diagram.js';
import { equilibrium } from '../core/physics/equilibrium.js';
import {
  boilingTemperature,
  type DiagramSetting,
  gapUncertainty,
  isGas,
  type PlacedPhase,
  placePhase,
} from '../core/physics/placed-phase.js';

type Placed = PlacedPhase<PhaseCurve>;

/** Diagram settings: the policy's pressure with the real gas first, then each stated transition's own. */
export function crossingsOfCase(substance: HarmonisedCase, curves: readonly PhaseCurve[], policy: Policy): Crossing[] {
  const found: Crossing[] = [];
  const isobars = new Set(curves.map((c) => c.family.isobarPa));
  for (const isobar of isobars) {
    const family = curves.filter((c) => c.family.isobarPa === isobar);
    if (family.length < 2) continue;
    const hasGas = family.some((c) => isGas(c.phase));
    const settings =
      isobar === null ? settingsOf(substance, policy, hasGas) : [{ pressurePa: isobar, gas: 'real' as const }];
    for (let k = 0; k < settings.length; k++) {
      const placed = family.map((c) => place(c, substance, settings[k]));
      for (let i = 0; i < placed.length; i++) {
        for (let j = i + 1; j < placed.length; j++) {
          const gas = placed[i].gas || placed[j].gas;
          // Without a gas, settings at one pressure repeat each other.
          if (!gas && settings.findIndex((s) => s.pressurePa === settings[k].pressurePa) < k) continue;
          if (!comparable(placed[i].source, placed[j].source)) continue;
          for (const t of crossingsOf(placed[i], placed[j])) {
            found.push(crossingAt(t, placed[i], placed[j], placed, settings[k], gas));
          }
        }
      }
    }
  }
  return found;
}

function comparable(a: PhaseCurve, b: PhaseCurve): boolean {
  return a.hasEnthalpyLevel && b.hasEnthalpyLevel && a.hasEntropyLevel && b.hasEntropyLevel;
}

function settingsOf(substance: HarmonisedCase, policy: Policy, hasGas: boolean): DiagramSetting[] {
  const settings: DiagramSetting[] = [{ pressurePa: policy.pressurePa, gas: 'real' }];
  for (const t of substance.transitions) {
    const gas = t.gas ?? 'real';
    if (gas === 'ideal' && !hasGas) continue;
    if (!settings.some((s) => s.pressurePa === t.pressurePa && s.gas === gas)) {
      settings.push({ pressurePa: t.pressurePa, gas });
    }
  }
  return settings;
}

export function place(curve: PhaseCurve, substance: HarmonisedCase, setting: DiagramSetting): Placed {
  return placePhase(curve, substance.substance, setting, boilingTemperature(substance.transitions));
}

function crossingAt(
  temperatureK: number,
  a: Placed,
  b: Placed,
  all: readonly Placed[],
  setting: DiagramSetting,
  gas: boolean,
): Crossing {
  const step = Math.max(1e-3, 1e-6 * temperatureK);
  const below = gibbsInDiagram(a, temperatureK - step) - gibbsInDiagram(b, temperatureK - step);
  const [from, to] = below < 0 ? [a, b] : [b, a];
  const { enthalpyJPerMol, entropyJPerMolK } = equilibrium(from, to, temperatureK);
  const uGap = gapUncertainty(from, to, temperatureK, setting.pressurePa);
  const g = gibbsInDiagram(from, temperatureK);
  let stable = true;
  for (const p of all) {
    if (p === a || p === b || temperatureK < p.lowK || temperatureK > p.highK) continue;
    if (!comparable(p.source, from.source)) continue;
    if (gibbsInDiagram(p, temperatureK) < g) stable = false;
  }
  const inData = (p: Placed): boolean => temperatureK >= p.source.measuredFromK && temperatureK <= p.source.measuredToK;
  return {
    family: a.source.family,
    from: from.source.phase,
    to: to.source.phase,
    pressurePa: setting.pressurePa,
    gas: gas ? setting.gas : null,
    temperatureK,
    uK: uGap / Math.abs(entropyJPerMolK),
    enthalpyJPerMol,
    entropyJPerMolK,
    stable,
    measured: inData(a) && inData(b),
  };
}
