import type { ReactNode } from 'react';
import { chooseTheme, useTheme } from '../theme.js';

/** The head of every page: the program, what is open, how it stands, and the ways that are always there. */
export function Head({ site, state, children }: { site?: ReactNode; state?: ReactNode; children?: ReactNode }) {
  const theme = useTheme();
  const other = theme === 'dark' ? 'light' : 'dark';
  return (
    <header className="head">
      <a className="name" href="#/">
        Varwright
      </a>
      {site === undefined ? null : (
        <>
          <span className="bar" aria-hidden="true" />
          <span className="site">{site}</span>
        </>
      )}
      <span className="state" role="status">
        {state}
      </span>
      <span className="ways">
        {site === undefined ? null : (
          <a className="way" href="#/">
            All sites
          </a>
        )}
        {site === undefined ? (
          <a className="way" href="/account">
            Account
          </a>
        ) : null}
        <button type="button" className="way" onClick={() => chooseTheme(other)}>
          {other === 'dark' ? 'Dark' : 'Light'}
        </button>
        <button type="button" className="way" onClick={() => window.print()}>
          Print
        </button>
      </span>
      {children === undefined ? null : <span className="ways more">{children}</span>}
    </header>
  );
}
