/** The commands and their options, as data: the parser and the help read the same table. */
export interface OptionPage {
  readonly name: string;
  /** What stands after it in the help; null for a switch. */
  readonly value: string | null;
  /** May be given several times, or be followed by several words. */
  readonly many?: boolean;
  readonly means: string;
}

export interface CommandPage {
  readonly name: CommandName;
  /** One line for the overview. */
  readonly does: string;
  /** The word that follows the command; null where it takes none. */
  readonly operand: { readonly name: string; readonly required: boolean; readonly means: string } | null;
  /** Words that must follow that one; further words belong to the last of them. */
  readonly further?: readonly { readonly name: string; readonly means: string }[];
  readonly options: readonly OptionPage[];
  /** Paragraphs that teach. */
  readonly teaches: readonly string[];
  readonly examples: readonly { readonly line: string; readonly does: string }[];
}

export type CommandName = 'nightly' | 'check' | 'show' | 'trace' | 'correct' | 'accept' | 'rules' | 'verify';

const sources: OptionPage = { name: 'sources', value: 'DIR', means: 'where the raw tables are (default ./sources)' };
const out: OptionPage = { name: 'out', value: 'DIR', means: 'where releases are kept (default ./out)' };
const policy: OptionPage = {
  name: 'policy',
  value: 'FILE',
  means: 'tolerances, grid, pressure … (default policy.json in the sources, else built in)',
};
const date: OptionPage = {
  name: 'date',
  value: 'YYYY-MM-DD',
  means: 'the release date, on which acceptances are judged (default today)',
};
const strict: OptionPage = { name: 'strict', value: null, means: 'end with status 3 when any substance is withheld' };
const jobs: OptionPage = {
  name: 'jobs',
  value: 'N',
  means: 'how many workers at most (default the cores); the result is the same on any number',
};
const only: OptionPage = {
  name: 'only',
  value: 'SUBSTANCE…',
  many: true,
  means: 'these substances and no others, by id',
};
const log: OptionPage = {
  name: 'log',
  value: 'text|json',
  means: 'json: one JSON object a line on standard output, for programs',
};

const by: OptionPage = { name: 'by', value: 'NAME', means: 'who answers for the entry' };
const finding = {
  name: 'FINDING',
  required: false,
  means: 'its id or the beginning of it; left out: lists the findings and their ids',
};

export const COMMANDS: readonly CommandPage[] = [
  {
    name: 'nightly',
    does: 'read every table, check it, and publish a release',
    operand: null,
    options: [
      sources,
      out,
      policy,
      date,
      strict,
      {
        name: 'accept-losses',
        value: null,
        means: 'publish although more than the allowed share of what was cleared becomes withheld',
      },
      jobs,
      only,
      log,
    ],
    teaches: [
      'Reads substances.csv and every source folder, makes one heat-capacity curve a phase, checks the tables, curves and transitions, and leaves a release in OUT/releases with OUT/current moved to it at the very end: a reader never sees half a release.',
      'A substance with a fault is withheld: its values stay out of the release, and the summary names the cell to look at first. The other substances are published all the same.',
      'Status: 0 published; 1 nothing could be published, the old release stands; 2 used wrongly; 3 with --strict, something is withheld; 4 too much of what was cleared would be lost, the old release stands and the new one is kept beside it.',
    ],
    examples: [
      { line: 'cuspline nightly', does: 'the whole library, ./sources to ./out' },
      {
        line: 'cuspline nightly --sources lab --out /srv/data --strict --log json',
        does: 'from a scheduler that reads JSON',
      },
      { line: 'cuspline nightly --only lead tin --out /tmp/try', does: 'two substances, beside the real releases' },
    ],
  },
  {
    name: 'check',
    does: 'do all that nightly does but publish; print what was found',
    operand: null,
    options: [sources, policy, date, strict, jobs, only, log],
    teaches: [
      'Nothing is written. Each finding is printed with the cell it starts from, what was expected there, and what to do next; findings that follow from another one stand under it.',
      'The unit and the factor to SI of every declared column are shown first, so that a wrong unit is seen before it does harm.',
      'Status: 0 checked; 1 nothing could be read; 2 used wrongly; 3 with --strict, something would be withheld.',
    ],
    examples: [
      { line: 'cuspline check', does: 'everything in ./sources' },
      { line: 'cuspline check --only lead', does: 'while the table of one substance is being typed in' },
    ],
  },
  {
    name: 'show',
    does: 'one substance: phases, transitions, findings, a G–T sketch',
    operand: { name: 'SUBSTANCE', required: true, means: 'its id, as in substances.csv' },
    options: [
      {
        name: 'pressure',
        value: 'VALUE',
        means: 'pressure of the diagram: 101325 (Pa), "1 atm", "50 kPa" … (default the policy’s)',
      },
      sources,
      policy,
      date,
      log,
    ],
    teaches: [
      'The sketch draws, for each phase, how far its Gibbs energy lies above the lowest one: a phase is stable where its letter runs along the bottom, and a transition is where one letter lands there and another leaves.',
    ],
    examples: [
      { line: 'cuspline show lead', does: 'at the policy’s pressure' },
      { line: 'cuspline show water --pressure "1 atm"', does: 'at another pressure' },
    ],
  },
  {
    name: 'trace',
    does: 'the raw numbers behind H, S and G of a phase, by their weight',
    operand: { name: 'SUBSTANCE', required: true, means: 'its id, as in substances.csv' },
    further: [
      { name: 'PHASE', means: 'cr, l, g, cr-alpha … as the tables and transitions call it' },
      { name: 'TEMPERATURE', means: '600, 600 K, 25 Cel …' },
    ],
    options: [{ name: 'all', value: null, means: 'every number, not the 20 largest' }, sources, policy, date, log],
    teaches: [
      'Each raw cell of the substance is moved in turn, up and down by a quarter of its last digit, and all is calculated again. That gives its sensitivity: by how much G changes for one SI unit of the cell. A formation enthalpy counts one to one, an entropy anchor −T, and one entropy in a smooth table far less, since its neighbours hold the curve.',
      'Times the cell’s own standard uncertainty this is its weight in J/mol; its square is the cell’s share of u(G)². The numbers with the largest shares are those to measure again. What is left to 100 % lies between the rows, or beyond them.',
      'A heat capacity also tells how well the table can be interpolated, so that its sensitivity holds for changes below its last digit only; the others hold for changes of any size. The temperatures of rows are taken as exact; a transition’s temperature counts where a level was carried through it. Cells that the checks name are left out of the curve and listed apart.',
    ],
    examples: [
      { line: 'cuspline trace lead l 700', does: 'the 20 numbers that matter most to liquid lead at 700 K' },
      { line: 'cuspline trace water g "25 Cel" --all', does: 'every one, at 25 °C' },
    ],
  },
  {
    name: 'correct',
    does: 'say in corrections.json what a suspect cell should say',
    operand: finding,
    options: [
      { name: 'suspect', value: 'N', means: 'the suspect to correct, as numbered (default 1)' },
      { name: 'value', value: 'TEXT', means: 'the cell as it should be, in its own unit (default as proposed)' },
      { name: 'reason', value: 'TEXT', means: 'why; the original compared, say (default the finding’s own words)' },
      { ...by, means: `${by.means} (default your login name)` },
      { name: 'yes', value: null, means: 'write it without asking' },
      sources,
      policy,
      { ...date, means: 'the date of the entry (default today)' },
      jobs,
      only,
      log,
    ],
    teaches: [
      'A raw file is never edited. The entry stands beside it, in the corrections.json of its source: file, line, column, what the cell says, what it should say, why, who and when. If the file changes there, the entry is out of date; it is then reported and no longer applied.',
      'First you see the entry, the cells that the data cannot tell from this one, and the crossings, findings and verdict before and after, calculated with the correction in force. On a terminal you are asked; elsewhere nothing is written without --yes. Compare the cell with the original first: the proposal is what fits, not what was measured.',
      'Status: 0 written, or findings listed; 1 nothing was written; 2 used wrongly.',
    ],
    examples: [
      { line: 'cuspline correct --only lead', does: 'the findings about one substance, with their ids' },
      { line: 'cuspline correct bb82d1c0', does: 'look at what would change, and decide' },
      {
        line: 'cuspline correct bb82d1c0 --value 600.61 --reason "page 12" --by Kim --yes',
        does: 'another value than the proposed one, from a script',
      },
    ],
  },
  {
    name: 'accept',
    does: 'let a disagreement stand, until a day',
    operand: finding,
    options: [
      { name: 'reason', value: 'TEXT', means: 'why it may stand' },
      by,
      { name: 'until', value: 'YYYY-MM-DD', means: 'the last day on which it holds' },
      sources,
      policy,
      { ...date, means: 'the date of the entry, from which it holds (default today)' },
      jobs,
      only,
      log,
    ],
    teaches: [
      'Writes an entry with the finding’s id and the hash of its evidence to accepted.json in the sources; an older entry for the same finding is replaced. An accepted finding stays in the release, marked so, and no longer withholds its substance.',
      'It lapses after its last day, and as soon as one of the printed cells behind the finding changes. Accept what is right and merely unusual; what is wrong wants cuspline correct.',
      'Status: 0 written, or findings listed; 1 nothing was written; 2 used wrongly.',
    ],
    examples: [
      { line: 'cuspline accept', does: 'the findings and their ids' },
      {
        line: 'cuspline accept bb82d1c0 --reason "new sample" --by Kim --until 2027-06-30',
        does: 'until the end of June 2027',
      },
    ],
  },
  {
    name: 'rules',
    does: 'list the rules, or explain one',
    operand: { name: 'RULE', required: false, means: 'the name of a rule' },
    options: [policy, log],
    teaches: [
      'With a name: its formula, its tolerance, what its three outcomes mean, and what would make it testable.',
    ],
    examples: [
      { line: 'cuspline rules', does: 'every rule in one line' },
      { line: 'cuspline rules gibbs-continuous', does: 'one rule in full' },
    ],
  },
  {
    name: 'verify',
    does: 'check that a release is whole and unchanged',
    operand: { name: 'RELEASE', required: true, means: 'the folder of a release, its id, or "current"' },
    options: [out, log],
    teaches: [
      'Compares the size and SHA-256 of every file with contents.json, and reports missing, changed and unexpected files.',
      'Status: 0 whole; 1 something differs; 2 used wrongly.',
    ],
    examples: [
      { line: 'cuspline verify current', does: 'what readers see now' },
      { line: 'cuspline verify out/releases/3f0c2a91d4e7', does: 'one release by its folder' },
    ],
  },
];
