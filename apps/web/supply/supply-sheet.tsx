import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { latestResult } from '../line/latest-result.js';
import { Headline } from '../working/headline.js';
import { DiagramFigure } from './diagram-figure.js';
import { LoadFields } from './load-fields.js';
import { MeasuredFields } from './measured-fields.js';
import { TransformerFields } from './transformer-fields.js';

const IEC_EDITIONS = ['IEC 61000-2-4:2002', 'EN 50160:2010'] as const;
const IEEE_EDITIONS = ['IEEE 519-2022', 'IEEE 519-2014'] as const;

/** The supply and its loads: a single-line diagram drawn from the data, edited by the fields beside it. */
export function SupplySheet() {
  const { state } = useDesk();
  const result = latestResult(state);
  const diagram = state.charts.supply?.singleLine;
  const transformers = (valueAt(state.document, 'supply.transformers') as unknown[] | undefined) ?? [];
  return (
    <>
      <Headline
        figures={
          result === null
            ? []
            : [
                {
                  value: result.network.shortCircuitMva,
                  unit: 'MVA',
                  under: 'fault level at the bus',
                  id: 'network.shortCircuitMva',
                },
                {
                  value: result.network.shortCircuitMinMva,
                  unit: 'MVA',
                  under: 'at the least',
                  id: 'network.shortCircuitMinMva',
                },
              ]
        }
      >
        {headline(state.document, transformers.length)}
      </Headline>
      <div className="split diagram">
        {diagram === undefined ? <NotDrawn /> : <DiagramFigure diagram={diagram} />}
        <section className="section" aria-labelledby="supply-fields">
          <h2 id="supply-fields">Supply</h2>
          <div className="fields">
            <QuantityField path="supply.faultLevelMva.max" label="fault level, greatest" unit="MVA" />
            <QuantityField
              path="supply.faultLevelMva.min"
              label="fault level, least"
              unit="MVA"
              otherwise="the same, assumed"
            />
            <QuantityField path="bus.nominalV" label="bus voltage" unit="V" />
            <QuantityField path="bus.highestV" label="bus, at the highest" unit="V" otherwise="assumed" />
            <QuantityField path="supply.rOverX" label="R/X of the supply" otherwise="0.1, assumed" />
            <QuantityField
              path="supply.resistanceExponent"
              label="resistance grows as order to"
              otherwise="0.5, assumed"
            />
            <QuantityField path="supply.rippleHz" label="ripple control" unit="Hz" otherwise="none" />
            <QuantityField path="frequencyHz" label="frequency" unit="Hz" />
          </div>
        </section>
      </div>
      <TransformerFields count={transformers.length} />
      <LoadFields />
      <MeasuredFields />
      <section className="section" aria-labelledby="rules">
        <h2 id="rules">Judged by</h2>
        <div className="fields">
          <TextField path="name" label="name of the site" isWide />
          <ChoiceField
            path="rules"
            label="rules"
            choices={[
              ['iec', 'IEC'],
              ['ieee', 'IEEE and NEC'],
            ]}
          />
          <ChoiceField
            path="limits.emcClass"
            label="class of the bus"
            otherwise="2, assumed"
            choices={[
              [1, 'class 1'],
              [2, 'class 2'],
              [3, 'class 3'],
            ]}
          />
          <ChoiceField
            path="limits.edition"
            label="limits by"
            otherwise="the rules’ own"
            choices={(valueAt(state.document, 'rules') === 'ieee' ? IEEE_EDITIONS : IEC_EDITIONS).map(
              (edition) => [edition, edition] as const,
            )}
          />
        </div>
      </section>
    </>
  );
}

function NotDrawn() {
  const { state } = useDesk();
  const isRefused = state.problems.length > 0 || Object.keys(state.typed).length > 0;
  return (
    <section className="section">
      <h2>Single-line diagram</h2>
      <p className="caption">
        {state.records.length === 0
          ? 'Drawn once a meter record is read.'
          : isRefused
            ? 'Drawn once the inputs are readable.'
            : 'Being drawn.'}
      </p>
    </section>
  );
}

function headline(document: unknown, transformers: number): string {
  const nominalV = valueAt(document, 'bus.nominalV');
  const max = valueAt(document, 'supply.faultLevelMva.max');
  const bus = typeof nominalV === 'number' ? formatQuantity(nominalV, 'V', 'given') : String(nominalV ?? 'The');
  const grid = typeof max === 'number' ? `a grid of ${formatQuantity(max, 'MVA', 'given')}` : 'the grid';
  if (transformers === 0) return `A ${bus} bus on ${grid}, without a transformer of its own.`;
  const through = transformers === 1 ? 'one transformer' : `${formatNumber(transformers, 'given')} transformers`;
  return `A ${bus} bus on ${grid}, through ${through}.`;
}
