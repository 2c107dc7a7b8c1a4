import type { TariffWindow } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';

/** One price, or a price for each of the windows that share out the time. */
export function PriceByWindow({ path, unit }: { path: string; unit: string }) {
  const { desk, state } = useDesk();
  const clause = valueAt(state.document, path) as { pricePerUnit?: number; prices?: Record<string, number> };
  const windows = (valueAt(state.document, 'tariff.windows') as TariffWindow[] | undefined) ?? [];
  const { prices, pricePerUnit, ...rest } = clause;
  if (prices === undefined) {
    return (
      <>
        <QuantityField path={`${path}.pricePerUnit`} label={unit} />
        {windows.length < 2 ? null : (
          <button
            type="button"
            className="way"
            onClick={() =>
              desk.type(path, '', {
                value: { ...rest, prices: Object.fromEntries(windows.map(({ name }) => [name, pricePerUnit ?? 0])) },
              })
            }
          >
            A price for each window
          </button>
        )}
      </>
    );
  }
  const first = Object.values(prices)[0] ?? 0;
  return (
    <>
      {Object.keys(prices).map((name) =>
        // a name that is no plain word cannot stand in a path
        /^[A-Za-z_]\w*$/.test(name) ? (
          <QuantityField key={name} path={`${path}.prices.${name}`} label={`${name}, ${unit}`} />
        ) : (
          <span key={name}>
            {name}: {prices[name]} {unit}
          </span>
        ),
      )}
      <button
        type="button"
        className="way"
        onClick={() => desk.type(path, '', { value: { ...rest, pricePerUnit: first } })}
      >
        One price
      </button>
    </>
  );
}
