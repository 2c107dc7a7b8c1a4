import { inShownMark } from '#libs/present/format-number.js';
import { pathWords } from '#libs/present/path-words.js';
import { fieldWords } from '#libs/present/review-words.js';
import { useDesk } from '../desk/use-desk.js';

/** Two versions of one site, side by side, with the fields in which they differ. */
export function DifferingFields() {
  const { desk, state } = useDesk();
  const { theirs, document } = state;
  if (theirs === null || document === null) return null;
  const rows = differences(document, theirs.site);
  return (
    <section className="notice" role="alert" aria-label="Two versions">
      <h2>Another window saved this site while you typed. Both versions are below.</h2>
      <div className="table">
        <table>
          <thead>
            <tr>
              <th scope="col">field</th>
              <th scope="col">typed here</th>
              <th scope="col">saved there</th>
            </tr>
          </thead>
          <tbody>
            {rows.map(([path, mine, other]) => (
              <tr key={path}>
                <th scope="row">{pathWords(path)}</th>
                <td>
                  <b>{mine}</b>
                </td>
                <td>
                  <b>{other}</b>
                </td>
              </tr>
            ))}
            {rows.length === 0 ? (
              <tr>
                <td colSpan={3}>Both hold the same.</td>
              </tr>
            ) : null}
          </tbody>
        </table>
      </div>
      <p className="row gap">
        <button type="button" className="button" onClick={() => desk.settle('mine')}>
          Go on with mine
        </button>
        <button type="button" className="button" onClick={() => desk.settle('theirs')}>
          Take theirs
        </button>
      </p>
    </section>
  );
}

/** Paths at which two documents differ, with both values as text. */
export function differences(mine: unknown, theirs: unknown, path = ''): [string, string, string][] {
  const isPart = (value: unknown): value is Record<string, unknown> => value !== null && typeof value === 'object';
  if (isPart(mine) && isPart(theirs)) {
    const keys = [...new Set([...Object.keys(mine), ...Object.keys(theirs)])];
    return keys.flatMap((key) => {
      const step = Array.isArray(mine) ? `${path}[${key}]` : path === '' ? key : `${path}.${key}`;
      return differences(mine[key], theirs[key], step);
    });
  }
  if (JSON.stringify(mine) === JSON.stringify(theirs)) return [];
  const text = (value: unknown) => (value === undefined ? 'nothing' : inShownMark(fieldWords(value)));
  return [[path, text(mine), text(theirs)]];
}
