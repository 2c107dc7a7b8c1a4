import type { Ageing } from '#libs/engine/index.js';
import { AGEING_HEADS, ageingNote, ageingFinding, ageingRows } from '#libs/present/ageing-rows.js';
import { RowTable } from '../draw/row-table.js';
import { VerdictWords } from '../draw/verdict-mark.js';

/** What becomes of the verdict as capacitors age, and when a stage must come out. */
export function AgeingTable({ ageing }: { ageing: Ageing }) {
  if (ageing.cases.length === 0) return null;
  const at = AGEING_HEADS.indexOf('verdict');
  const rows = ageingRows(ageing).map((row, k) =>
    row.map((cell, column) =>
      column === at ? <VerdictWords key={column} verdict={ageing.cases[k]!.verdict} /> : cell,
    ),
  );
  return (
    <section className="section" aria-labelledby="ageing">
      <h2 id="ageing">{`Ageing: ${ageingFinding(ageing)}`}</h2>
      <p className="caption">{ageingNote()}</p>
      <RowTable name="Ageing" heads={AGEING_HEADS} rows={rows} right={[1, 2, 3, 5]} judged={at} />
    </section>
  );
}
