import type { Result } from '#libs/engine/index.js';
import { deviceTable, openDevices } from '#libs/present/device-words.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { RowTable } from '../draw/row-table.js';

const HEADS = ['device', 'meets', 'needs', 'site has', 'stands', 'basis'];

/** Every device with what it meets, the rating it needs, what the site has and on what that rests; never a product. */
export function DeviceTable({ result }: { result: Result }) {
  const { devices, conductorMinA } = result;
  if (devices.length === 0) return null;
  const open = openDevices(devices);
  const short = devices.filter(({ state }) => state === 'short').length;
  const left = open === 0 ? 'every one is entered' : `${formatNumber(open, 'given')} not entered`;
  return (
    <section className="section" aria-labelledby="devices">
      <h2 id="devices">
        {short === 0
          ? `Devices: none entered falls short; ${left}`
          : `Devices: ${formatNumber(short, 'given')} ${short === 1 ? 'falls' : 'fall'} short; ${left}`}
      </h2>
      <p className="caption">
        {`Ratings and settings, never a product. Conductors and disconnector for ${formatQuantity(conductorMinA, 'A')} or more.`}
      </p>
      <RowTable
        name="Devices"
        heads={HEADS}
        judged={HEADS.indexOf('stands')}
        rows={deviceTable({ result }).map(({ device, met, need, fitted, state, basis }) => [
          device,
          met,
          need,
          fitted === '–' ? (
            fitted
          ) : (
            <span key={device} className="nowrap">
              {fitted}
            </span>
          ),
          state === 'falls short' ? (
            <b key={device} className="nowrap">
              {state}
            </b>
          ) : (
            state
          ),
          basis === '' ? null : (
            <span key={device} className="soft nowrap">
              {basis}
            </span>
          ),
        ])}
      />
    </section>
  );
}
