import { useEffect, useState } from 'react';
import { ask } from '../api/ask.js';
import type { SiteShown } from '../api/shown.js';
import { Head } from '../line/head.js';

const ROWS: [string, string[]][] = [
  ['Transformer', ['plate: kVA, impedance %, load loss', 'taps and the one in use', 'photograph of the plate']],
  [
    'Main board',
    ['nominal and highest voltage', 'free breaker way: rating, place', 'photograph, doors open, at a safe distance'],
  ],
  ['Current transformer', ['ratio and class', 'place: before or behind the bank’s branch', 'direction']],
  ['Old bank', ['in or out, since when', 'plates of stages and reactors', 'what the controller shows']],
  ['Loads', ['drives and rectifiers: current, kind, choke', 'motors above 30 kW', 'welders, furnaces, large lighting']],
  ['Room', ['free width, depth, height', 'temperature and dust', 'cable route and length to the board']],
  [
    'Meter',
    [
      'where it stands: bus or primary',
      'how interval data can be had, for which months',
      'tariff’s clause on reactive energy',
    ],
  ],
];

/** One page for the visit, with room to write. */
export function SurveySheet({ siteId }: { siteId: string }) {
  const [name, setName] = useState('');
  useEffect(() => {
    void ask<SiteShown>(`/api/sites/${siteId}`).then(({ body }) => setName(body.name));
  }, [siteId]);
  return (
    <div className="sheet">
      <Head site={<a href={`#/sites/${siteId}/record`}>{name}</a>} />
      <div className="sites-line" />
      <main className="sites">
        <h1>Site survey: {name}</h1>
        <p className="caption">
          Three questions decide most: how strong is the supply, what distorts, and was a bank working while the record
          was taken?
        </p>
        <table>
          <thead>
            <tr>
              <th scope="col">what</th>
              <th scope="col">look for</th>
              <th scope="col">found</th>
            </tr>
          </thead>
          <tbody>
            {ROWS.flatMap(([what, looks]) =>
              looks.map((look, at) => (
                <tr key={look} style={{ height: 34 }}>
                  {at === 0 ? (
                    <th scope="rowgroup" rowSpan={looks.length}>
                      {what}
                    </th>
                  ) : null}
                  <td>{look}</td>
                  <td style={{ width: '45%' }} />
                </tr>
              )),
            )}
          </tbody>
        </table>
        <p className="row gap caption">Surveyed by ______________________ on ______________</p>
      </main>
    </div>
  );
}
