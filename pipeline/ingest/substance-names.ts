/** What a source calls a substance -> its place in the list of all substances. */
import type { Substance } from '../../schemas/substances.js';
import { nearest, nearestWords } from './nearest.js';
import type { TablePlan } from './plan.js';

export class SubstanceNames {
  private readonly placeOfId = new Map<string, number>();

  constructor(private readonly substances: readonly Substance[]) {
    for (const [place, { id }] of substances.entries()) this.placeOfId.set(id, place);
  }

  /** The place, or why there is none. An id names itself. */
  resolve(plan: TablePlan, name: string): number | 'name-unmapped' | 'substance-unknown' {
    const mapped = Object.hasOwn(plan.names, name) ? plan.names[name]! : null;
    const place = this.placeOfId.get(mapped ?? name);
    if (place !== undefined) return place;
    return mapped === null ? 'name-unmapped' : 'substance-unknown';
  }

  /** The nearest ids, by id, name or formula, as words to add to a message. */
  near(plan: TablePlan, name: string): string {
    const direct = nearestWords(name, [...this.placeOfId.keys(), ...Object.keys(plan.names)]);
    if (direct !== '') return direct;
    const words = new Map<string, string>();
    for (const { id, name: called, formula } of this.substances) {
      if (called !== '') words.set(called, id);
      if (formula !== '') words.set(formula, id);
    }
    const ids = nearest(name, words.keys()).map((word) => words.get(word)!);
    return ids.length === 0 ? '' : `; nearest: ${[...new Set(ids)].join(', ')}`;
  }
}
