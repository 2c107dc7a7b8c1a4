import { expectedWords, pathWords } from '#libs/present/path-words.js';
import { siteAddress, stationOfPath } from '../address.js';
import { isChanged } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { DifferingFields } from './differing-fields.js';

function inSentence(path: string): string {
  const words = pathWords(path);
  return `${words.charAt(0).toUpperCase()}${words.slice(1)}`;
}

/** What stands in the way of keeping, above the open station: nothing typed is lost meanwhile. */
export function Notices() {
  const { desk, state } = useDesk();
  const { offlineSince, theirs, fault, problems, typed } = state;
  const general = problems.filter(({ path }) => path === undefined);
  return (
    <>
      {offlineSince === null ? null : (
        <p className="notice" role="alert">
          {isChanged(state) ? 'Not saved: no' : 'No'} connection since {offlineSince}. What you type is kept.{' '}
          <button type="button" className="way" onClick={() => void desk.open()}>
            Try again
          </button>
        </p>
      )}
      {theirs === null ? null : <DifferingFields />}
      {fault === null ? null : (
        <p className="notice" role="alert">
          Not computed: {fault}
        </p>
      )}
      {(state.stage === 'unknown' ? [] : general).map(({ expected, found }) => (
        <p className="notice" role="alert" key={expected}>
          Refused: it needs {expectedWords(expected)}; found {found}.
        </p>
      ))}
      {problems.length === general.length ? null : (
        <div className="notice" role="alert">
          <p>Refused; the figures below are those from before.</p>
          <ul>
            {problems.map(({ path, expected, found }) =>
              path === undefined ? null : (
                <li key={`${path} ${expected}`}>
                  <a href={siteAddress(desk.siteId, stationOfPath(path), { field: path })}>{inSentence(path)}</a>{' '}
                  {`needs ${expectedWords(expected)}; found ${found}.`}
                </li>
              ),
            )}
          </ul>
        </div>
      )}
      {Object.keys(typed).length === 0 ? null : (
        <p className="notice">A field is not readable yet; the figures below are those from before it.</p>
      )}
    </>
  );
}
