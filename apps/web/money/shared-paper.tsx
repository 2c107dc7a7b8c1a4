import type { ReactNode } from 'react';
import { type HeldPapers, type PaperKind, type PaperNamed, paperNamed } from '../desk/held-papers.js';
import { useDesk } from '../desk/use-desk.js';
import { RowTable } from '../draw/row-table.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';
import { paperRows, rowsInWords } from '../papers/paper-rows.js';
import { usePapers } from '../papers/use-papers.js';

const WORDS: Record<PaperKind, { label: string; own: string; thing: string }> = {
  tariff: { label: 'the tariff is', own: 'the site’s own', thing: 'tariff' },
  prices: { label: 'the price book is', own: 'the site’s own', thing: 'price book' },
};

/**
 * Whether a tariff or price book is the site's own or a shared paper, and which version; a shared one is shown, the
 * site's own is edited below. Back to its own, a site gets what was kept of it, else a copy of the paper.
 */
export function SharedPaper({ kind, children }: { kind: PaperKind; children: ReactNode }) {
  const { desk, state } = useDesk();
  const { papers } = usePapers();
  const named = paperNamed(state.document, kind);
  const held = named === undefined ? undefined : state.held[kind];
  const path = `papers.${kind}`;
  const choices = choicesOf(
    (papers ?? []).filter((paper) => paper.kind === kind),
    named,
  );
  const choose = (chosen: PaperNamed | undefined) => {
    const own = chosen === undefined ? (state.site?.site[kind] ?? held?.document) : undefined;
    desk.type(path, '', { value: chosen });
    desk.type(kind, '', { value: own });
  };
  return (
    <>
      {choices.length === 0 ? null : (
        <div className="fields shared">
          <FieldFrame path={path} label={WORDS[kind].label} refusal={refusalOf(state.problems, path)}>
            <select
              id={`field:${path}`}
              className="wide"
              value={named === undefined ? '' : JSON.stringify(named)}
              onChange={({ target }) => choose(target.value === '' ? undefined : JSON.parse(target.value))}
            >
              <option value="">{WORDS[kind].own}</option>
              {choices.map(([value, words]) => (
                <option key={value} value={value}>
                  {words}
                </option>
              ))}
            </select>
          </FieldFrame>
        </div>
      )}
      {named === undefined ? children : <Held kind={kind} named={named} held={held} />}
    </>
  );
}

/** The latest of each name, then each version; what the site names is among them even where it is not known here. */
function choicesOf(
  papers: readonly { name: string; version: number; date: string }[],
  named: PaperNamed | undefined,
): [value: string, words: string][] {
  const names = [...new Set(papers.map(({ name }) => name))];
  const choices = names.flatMap((name): [string, string][] => [
    [JSON.stringify({ name }), `${name}, the latest version`],
    ...papers
      .filter((paper) => paper.name === name)
      .map(({ version, date }): [string, string] => [
        JSON.stringify({ name, version }),
        `${name}, version ${version}, from ${date}`,
      ]),
  ]);
  const own = named === undefined ? null : JSON.stringify(named);
  if (own === null || choices.some(([value]) => value === own)) return choices;
  return [...choices, [own, `${named?.name}${named?.version === undefined ? '' : `, version ${named.version}`}`]];
}

/** What a shared paper says, and the version the kept revision froze. */
function Held({ kind, named, held }: { kind: PaperKind; named: PaperNamed; held: HeldPapers[PaperKind] }) {
  const { state } = useDesk();
  const { thing } = WORDS[kind];
  const frozen = (
    state.kept?.inputs.site.papers as Partial<Record<PaperKind, PaperNamed & { date: string }>> | undefined
  )?.[kind];
  return (
    <>
      <p>
        {held === undefined
          ? `No shared ${thing} “${named.name}” is kept here. Choose another, or the site’s own.`
          : `“${held.name}”, version ${held.version}, holds from ${held.date}. It is changed under `}
        {held === undefined ? null : <a href="#/papers">Shared tariffs and price books</a>}
        {held === undefined ? '' : ', for every site that names it.'}
      </p>
      {frozen === undefined ? null : (
        <p className="caption">{`Revision ${state.kept?.revision} was made with version ${frozen.version}, from ${frozen.date}, and keeps it.`}</p>
      )}
      {held === undefined ? null : (
        <details>
          <summary className="way">What it says</summary>
          <RowTable
            name={`${held.name}, version ${held.version}`}
            heads={['field', 'value']}
            rows={rowsInWords(paperRows(held.document))}
          />
        </details>
      )}
    </>
  );
}
