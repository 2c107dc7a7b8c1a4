import { useState } from 'react';
import { type Ends, firstLook, type Result } from '#libs/engine/index.js';
import { formatNumber, formatQuantity, formatRange } from '#libs/present/format-number.js';
import { type KnownOfSite, visitQuestions } from '#libs/present/visit-questions.js';
import { siteAddress, stationOfPath } from '../address.js';
import { useDesk } from '../desk/use-desk.js';
import { TypedQuantity } from '../field/quantity-field.js';

/** Customary ends, from memory: where nothing better is typed they give the order of magnitude alone. */
const CUSTOMARY = { perKvarh: { low: 0.005, high: 0.02 }, perKvar: { low: 25, high: 60 } };

/** What record and transformer alone say: need, orders of money, and what to ask on the visit. */
export function FirstLook({ result }: { result: Result }) {
  const { desk, state } = useDesk();
  const [perKvarh, setPerKvarh] = useState<Partial<Ends>>({});
  const [perKvar, setPerKvar] = useState<Partial<Ends>>({});
  const { requirement, record } = result;
  const hours = (record.intervals * record.intervalS) / 3600;
  const prices = { perKvarh: { ...CUSTOMARY.perKvarh, ...perKvarh }, perKvar: { ...CUSTOMARY.perKvar, ...perKvar } };
  const look = firstLook(requirement, hours, prices);
  const currency = String(state.document?.currency ?? '');
  const survey = siteAddress(desk.siteId, 'record').replace('/record', '/survey');
  return (
    <section className="section" aria-labelledby="first-look">
      <h2 id="first-look">{heading(result)}</h2>
      <p className="caption">From the record and the transformer alone; nothing of it is an offer.</p>
      <div className="split halves first-look">
        <div>
          <h3>{`Money: ${rounded(look.capital, currency)} to build, ${rounded(look.saving, currency)} saved a year`}</h3>
          <p className="caption">
            {`${formatQuantity(look.avoidableKvarh / 1000, 'Mvarh')} a year lie beyond the target. ${
              look.paybackYears === null
                ? 'Nothing is saved by them at these prices.'
                : `Paid back in ${rounded(look.paybackYears, 'years')}, before demand charges and losses.`
            } The prices are customary, from memory, ${currency === '' ? 'in a currency such as the euro' : `in ${currency}`}; put in your own.`}
          </p>
          <div className="fields">
            <PriceField
              name="perKvarh"
              label="a kvarh beyond, least"
              end="low"
              ends={prices.perKvarh}
              put={setPerKvarh}
            />
            <PriceField name="perKvarh" label="at the most" end="high" ends={prices.perKvarh} put={setPerKvarh} />
            <PriceField
              name="perKvar"
              label="a kvar installed, least"
              end="low"
              ends={prices.perKvar}
              put={setPerKvar}
            />
            <PriceField name="perKvar" label="at the most" end="high" ends={prices.perKvar} put={setPerKvar} />
          </div>
        </div>
        <div>
          <h3>To ask on the visit</h3>
          <ol className="asked">
            {visitQuestions((state.document ?? {}) as KnownOfSite).map(({ path, question, why }) => (
              <li key={path}>
                <a href={siteAddress(desk.siteId, stationOfPath(path), { field: path })}>{question}</a>
                <p className="caption">{why}</p>
              </li>
            ))}
          </ol>
          <p className="row gap">
            <a href={survey}>A sheet for the visit, to print</a>
          </p>
        </div>
      </div>
    </section>
  );
}

function heading({ requirement }: Result): string {
  const target = formatNumber(requirement.targetPowerFactor, 'given');
  if (requirement.maxKvar <= 1e-9) return `A first look: the site holds ${target} already`;
  const need = formatRange({ low: requirement.p99Kvar, high: requirement.maxKvar }, 'kvar', 'computed');
  return `A first look: ${need} to hold ${target}`;
}

/** An order of magnitude: two digits. */
function rounded({ low, high }: Ends, unit: string): string {
  const two = (value: number) => Number(value.toPrecision(2));
  return formatRange({ low: two(low), high: two(high) }, unit);
}

function PriceField({
  name,
  label,
  end,
  ends,
  put,
}: {
  name: string;
  label: string;
  end: keyof Ends;
  ends: Ends;
  put: (change: (before: Partial<Ends>) => Partial<Ends>) => void;
}) {
  return (
    <TypedQuantity
      path={`firstLook.${name}.${end}`}
      label={label}
      kept={ends[end]}
      onType={(_, read) => {
        if (read?.value !== undefined && read.value >= 0) put((before) => ({ ...before, [end]: read.value }));
      }}
    />
  );
}
