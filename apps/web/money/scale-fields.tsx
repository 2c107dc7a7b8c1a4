import type { Scale } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';
import { QuantityField } from '../field/quantity-field.js';
import { RowFields } from './row-fields.js';

const STARTERS: Record<Scale['form'], Scale> = {
  ratio: { form: 'ratio', reference: 0.9, belowPct: 100, abovePct: 0 },
  points: { form: 'points', reference: 0.9, below: [{ downTo: 0, pctPerPoint: 1 }] },
  steps: {
    form: 'steps',
    steps: [
      { from: 0, pct: 10 },
      { from: 0.9, pct: 0 },
    ],
  },
};

/** A percentage that follows the power factor. */
export function ScaleFields({ path }: { path: string }) {
  const { desk, state } = useDesk();
  const scale = valueAt(state.document, path) as Scale | undefined;
  return (
    <>
      <div className="sentence">
        <span>The percentage follows the power factor</span>
        <FieldFrame path={path} label="how" refusal={refusalOf(state.problems, path)}>
          <select
            id={`field:${path}`}
            value={scale?.form ?? ''}
            onChange={({ target }) => desk.type(path, '', { value: STARTERS[target.value as Scale['form']] })}
          >
            {scale === undefined ? <option value="">not at all</option> : null}
            <option value="ratio">in proportion</option>
            <option value="points">point by point</option>
            <option value="steps">in steps</option>
          </select>
        </FieldFrame>
        {scale === undefined || scale.form === 'steps' ? null : (
          <QuantityField path={`${path}.reference`} label="around a power factor of" />
        )}
        {scale?.form === 'ratio' ? (
          <>
            <QuantityField path={`${path}.belowPct`} label="below it, of the ratio" unit="%" />
            <QuantityField path={`${path}.abovePct`} label="above it, of the ratio" unit="%" />
          </>
        ) : null}
      </div>
      {scale?.form === 'points' ? (
        <>
          <RowFields
            path={`${path}.below`}
            row="band below"
            starter={{ downTo: 0, pctPerPoint: 1 }}
            columns={[
              { key: 'downTo', label: 'down to' },
              { key: 'pctPerPoint', label: 'a point of 0.01 adds', unit: '%' },
            ]}
          />
          <RowFields
            path={`${path}.above`}
            row="band above"
            starter={{ upTo: 1, pctPerPoint: -0.5 }}
            columns={[
              { key: 'upTo', label: 'up to' },
              { key: 'pctPerPoint', label: 'a point of 0.01 adds', unit: '%' },
            ]}
          />
        </>
      ) : null}
      {scale?.form === 'steps' ? (
        <RowFields
          path={`${path}.steps`}
          row="step"
          starter={{ from: 1, pct: 0 }}
          columns={[
            { key: 'from', label: 'from a power factor of' },
            { key: 'pct', label: 'it is', unit: '%' },
          ]}
        />
      ) : null}
    </>
  );
}
