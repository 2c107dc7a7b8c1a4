import type { MeasuredCheck } from '#libs/engine/index.js';
import { MEASURED_HEADS, measuredFinding, measuredNote, measuredRows } from '#libs/present/measured-rows.js';
import { plainName } from '#libs/present/plain-name.js';
import { RowTable } from '../draw/row-table.js';

/** A measurement beside the model with the same kvar connected. */
export function MeasuredTable({ measured }: { measured: MeasuredCheck | null }) {
  if (measured === null || measured.rows.length === 0) return null;
  return (
    <section className="section" aria-labelledby="measured">
      <h2 id="measured">{`Measured at ${plainName(measured.bus)}: ${measuredFinding(measured)}`}</h2>
      <p className="caption">{measuredNote(measured)}</p>
      <RowTable
        name="Measured and computed"
        heads={MEASURED_HEADS}
        rows={measuredRows(measured)}
        right={[2, 3, 4, 5]}
      />
    </section>
  );
}
