/** The words of `sources/README.md`; what is planted comes from the slips themselves. */
export function readme(slips, corrections) {
  const rows = slips.map(
    (slip) =>
      `| ${slip.medium} | \`${slip.source}/${slip.file}\` | ${slip.line} | \`${slip.column}\` | ${slip.printed} | ${slip.clean} | ${slip.about}: ${slip.kind} |`,
  );
  const fixed = corrections.map(
    ({ source, medium, correction: c }) =>
      `${medium}, \`${source}/${c.file}\` line ${c.line}, column \`${c.column}\`: printed ${c.printed}, corrected to ${c.corrected}.`,
  );
  return `# The demo: a property desk of a heat-storage cooperative

A cooperative of district-heating works stores summer heat in melting media: salts, waxes and alcohols, soft metals. Its
property desk keeps the thermal data of 24 media that its members may buy, and passes them on to the engineers who size
the stores. The figures come from four places and nobody has time to retype them. Every night the desk wants to know which
media are consistent, and for the others which cell to look at.

**Everything here is invented**: the media, the figures, the sources. No likeness to a real substance, product or person is
meant, and nothing here may be used for a real store.

## What is in the folders

| Folder | What it is | How it looks |
| --- | --- | --- |
| \`quay-tables\` | an evaluated compilation, eleven media | one comma-separated file a medium under two title lines, its phases one below the other; Cp, S, −[G − H(Tr)]/T and H − H(Tr) in J and kJ with three decimals; metastable branches; formation data and transitions in files of their own |
| \`grey-binder\` | an older compilation, seven media | tab-separated sheets with comment lines, thermochemical calories, gas entropies at 1 atm, temperature scale not stated; a metal and a salt in tables that run through the melting point with H counted from the crystal (\`through-the-melt\`); one correction in force |
| \`bench-two\` | a laboratory, six media and one series of calmorite | measured Cp per gram in runs, semicolons, decimal commas, temperatures in °C, a byte-order mark and CRLF; stated uncertainties (coverage factor 2), a shared calibration part for each run; transitions from a scanning calorimeter; vessium was measured on the temperature scale of 1968 |
| \`vapour-models\` | computed ideal gases of four media | one gzipped comma-separated file, SI |

\`substances.csv\` lists the media. None has a formula, so each has a molar mass. Four media take their gas from
\`vapour-models\` and the rest from another source; calmorite rests on three.

The clean figures follow from stated laws, Cp = a + bT + c/T² + dT² for each phase, with H and S their exact integrals and G
equal on both sides of every transition before rounding. Media, laws and slips are made by
\`test/demo/make-demo.js\` (\`node test/demo/make-demo.js --check\` makes all of it again and compares).

## What is planted

Sixteen media are clean. Eight have one slip each, in one cell:

| Medium | File | Line | Column | Printed | Should say | What happened |
| --- | --- | --- | --- | --- | --- | --- |
${rows.join('\n')}

One more misprint has been found already and is put right by \`corrections.json\`, so the medium is clean; the raw file keeps
what was printed: ${fixed.join(' ')}

A night should clear the sixteen, withhold the eight and name the cells. Lines count from 1, header and comment lines
included. The same list, for programs: \`test/demo/planted-slips.json\`.

## Cautions

- Consistent is not the same as true: a compilation that was computed from one set of figures agrees with itself.
- Nothing about decomposition, reactivity, corrosion or ignition is modelled. A phase that these tables call stable may
  burn, decompose or attack its container.
- A medium that is withheld is withheld for a reason. Do not put an older value in its place unseen.
- Where pressure, fire or toxic substances are concerned, local codes and licensed practice decide.
`;
}
