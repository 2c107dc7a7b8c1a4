import type { SpectrumName } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { valueAt } from '../field/document-path.js';
import { ListEntry } from '../field/list-entry.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';

const SPECTRA: readonly (readonly [SpectrumName, string])[] = [
  ['six-pulse-choke', 'six-pulse, choke'],
  ['six-pulse-no-choke', 'six-pulse, no choke'],
  ['six-pulse', 'six-pulse'],
  ['six-pulse-ideal', 'six-pulse, ideal'],
  ['twelve-pulse', 'twelve-pulse'],
  ['active-front-end', 'active front end'],
  ['drive-benchmark', 'drive benchmark'],
  ['single-phase-electronic', 'single-phase electronic'],
];

/** What distorts, what the supply brings, what damps. */
export function LoadFields() {
  return (
    <>
      <Distorting />
      <Background />
      <section className="section" aria-labelledby="damping">
        <h2 id="damping">What damps a resonance</h2>
        <div className="fields">
          <QuantityField
            path="loads.motorSharePct"
            label="motors, of the damping load"
            unit="%"
            otherwise="60, assumed"
          />
          <QuantityField
            path="loads.dampingKw.max"
            label="damping load, at the most"
            unit="kW"
            otherwise="the mean load"
          />
          <QuantityField path="loads.dampingKw.min" label="at the least" unit="kW" otherwise="0, assumed" />
          <ChoiceField
            path="loads.summation"
            label="several loads add"
            otherwise="by exponent, assumed"
            choices={[
              ['exponent', 'by exponent'],
              ['arithmetic', 'arithmetically'],
            ]}
          />
        </div>
      </section>
    </>
  );
}

function Distorting() {
  const { desk, state } = useDesk();
  const path = 'loads.distorting';
  const list = valueAt(state.document, path) as unknown[] | undefined;
  const put = (next: unknown[] | undefined) => desk.type(path, '', { value: next });
  const another = { name: 'drives', fundamentalA: 100, spectrum: 'six-pulse-choke' };
  return (
    <section className="section" aria-labelledby="distorting">
      <div className="plot-head">
        <h2 id="distorting">Loads that distort</h2>
        <span className="ways">
          <button type="button" className="way" id={`field:${path}`} onClick={() => put([...(list ?? []), another])}>
            Add a load
          </button>
          {list === undefined ? (
            <button type="button" className="way" onClick={() => put([])}>
              There are none
            </button>
          ) : null}
        </span>
      </div>
      <p className="caption">
        {list === undefined
          ? 'Not known yet: the network is not judged as within limits until this is said.'
          : list.length === 0
            ? 'Declared: no load distorts.'
            : 'Drives, rectifiers, welders, lighting: fundamental current and the kind of spectrum.'}
      </p>
      {list?.map((load, at) => (
        <ListEntry key={at} name={`Distorting load ${at + 1}`} remove={() => put(list.toSpliced(at, 1))}>
          <TextField path={`${path}[${at}].name`} label="name" />
          <QuantityField path={`${path}[${at}].fundamentalA`} label="fundamental" unit="A" />
          {(load as { orders?: unknown[] }).orders === undefined ? (
            <ChoiceField path={`${path}[${at}].spectrum`} label="spectrum" choices={SPECTRA} />
          ) : (
            <p className="caption">orders as measured: {(load as { orders: unknown[] }).orders.length}</p>
          )}
        </ListEntry>
      ))}
    </section>
  );
}

function Background() {
  const { desk, state } = useDesk();
  const path = 'loads.backgroundPct';
  const list = valueAt(state.document, path) as unknown[] | undefined;
  const put = (next: unknown[] | undefined) => desk.type(path, '', { value: next });
  return (
    <section className="section" aria-labelledby="background">
      <div className="plot-head">
        <h2 id="background">What the supply brings, with the plant off</h2>
        <span className="ways">
          <button
            type="button"
            className="way"
            id={`field:${path}`}
            onClick={() => put([...(list ?? []), { orderH: 5, pct: 1 }])}
          >
            Add an order
          </button>
          {list === undefined ? (
            <button type="button" className="way" onClick={() => put([])}>
              There is none
            </button>
          ) : null}
        </span>
      </div>
      <p className="caption">
        {list === undefined
          ? 'Not known yet.'
          : list.length === 0
            ? 'Declared: the supply is free of distortion.'
            : 'Voltage behind the source, % of nominal.'}
      </p>
      {list?.map((_, at) => (
        <ListEntry key={at} name={`Background order ${at + 1}`} remove={() => put(list.toSpliced(at, 1))}>
          <QuantityField path={`${path}[${at}].orderH`} label="order" />
          <QuantityField path={`${path}[${at}].pct`} label="voltage" unit="%" />
        </ListEntry>
      ))}
    </section>
  );
}
