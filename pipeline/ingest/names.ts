/** A source's names kept as a two-column CSV: what it calls a substance, and its id. */
import papaparse from 'papaparse/papaparse.js';

export function namesFromCsv(text: string): Readonly<Record<string, string>> {
  const names: Record<string, string> = {};
  for (const [name, id] of papaparse.parse(text, { skipEmptyLines: true }).data)
    if (name !== undefined && id !== undefined) names[name.trim()] = id.trim();
  return names;
}
