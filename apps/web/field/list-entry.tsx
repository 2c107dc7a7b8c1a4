import type { ReactNode } from 'react';

/** The fields of one entry of a list, and the way to take it out. */
export function ListEntry({ name, remove, children }: { name: string; remove: () => void; children: ReactNode }) {
  return (
    <fieldset aria-label={name}>
      <div className="fields">
        {children}
        <p className="row">
          <button type="button" className="way" onClick={remove}>
            Remove<span className="hidden"> {name}</span>
          </button>
        </p>
      </div>
    </fieldset>
  );
}
