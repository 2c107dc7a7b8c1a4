import type { BankInput } from '#libs/engine/index.js';
import type { Station } from '../address.js';
import { ask, NoConnection, Refused } from '../api/ask.js';
import type { RevisionShown, SiteShown } from '../api/shown.js';
import { withValueAt } from '../field/document-path.js';
import { paperAsked } from '../proposal/paper-language.js';
import { clockNow } from './clock-now.js';
import { Connection } from './connection.js';
import { InputRefused } from './desk-link.js';
import { type DeskState, isChanged, lookAsked, NOTHING_YET, staleFrom, studiedDocument } from './desk-state.js';
import { dropDraft, keepDraft, withDraft } from './draft.js';
import { EngineDesk } from './engine-desk.js';
import { fetchKept, saveDocument } from './fetch-kept.js';
import { followJob, type JobEnd, keptJob } from './follow-job.js';
import { fetchHeldPapers } from './held-papers.js';
import type { Firmness, Look, LookAsked, Picks, Trace } from './look.js';
import { mergedLook } from './merged-look.js';

/** The wait for a first plan that is being made elsewhere [ms]. */
const FIRST_PLAN_MS = 1500;

/** Everything one site's page does: holds what is typed, asks the engine and the server, and says what came of it. */
export class SiteDesk {
  readonly siteId: string;
  readonly #path: string;
  #state: DeskState = NOTHING_YET;
  #station: Station = 'bank';
  #engine: EngineDesk | null = null;
  #engineRecord = '';
  #full: Look | null = null;
  #stopJob: (() => void) | null = null;
  #closed = false;
  /** what is typed while it is lost stays as it is */
  readonly #connection = new Connection({
    lost: () => this.#hear(new NoConnection('no connection')),
    mend: () => this.#refreshThen(() => this.#prepareEngine()),
  });
  readonly #listeners = new Set<() => void>();

  constructor(siteId: string) {
    this.siteId = siteId;
    this.#path = `/api/sites/${siteId}`;
  }

  readonly subscribe = (changed: () => void): (() => void) => {
    this.#listeners.add(changed);
    return () => this.#listeners.delete(changed);
  };

  readonly state = (): DeskState => this.#state;

  /** Loads the site, its records and its latest revision. */
  async open(): Promise<void> {
    try {
      const site = (await ask<SiteShown>(this.#path)).body;
      this.#set(withDraft(site));
      await this.#refresh();
      this.#set({ stage: 'open', held: await fetchHeldPapers(this.#state.document) });
      this.#prepareEngine();
      const jobId = keptJob(this.siteId);
      if (jobId !== null) this.#follow(jobId);
    } catch (error) {
      this.#hear(error);
      if (this.#state.stage === 'opening') this.#set({ stage: error instanceof Refused ? 'unknown' : 'unreachable' });
    }
  }

  close(): void {
    this.#closed = true;
    this.#engine?.close();
    this.#stopJob?.();
    this.#connection.close();
  }

  openStation(station: Station): void {
    this.#station = station;
    this.#look(true);
  }

  /** A field was typed in: a value, or a text that is none yet. */
  type(path: string, text: string, read: { value: unknown } | null): void {
    const { [path]: _, ...others } = this.#state.typed;
    if (read === null) {
      this.#set({ typed: { ...others, [path]: text } });
      return;
    }
    const document = withValueAt(this.#state.document!, path, read.value);
    this.#set({ typed: others, document, problems: this.#state.problems.filter((problem) => problem.path !== path) });
    this.#edited();
    if (path.startsWith('papers.')) this.#hold();
  }

  /** The bank under the hand; null puts the kept one back. */
  tryBank(trial: BankInput | null): void {
    this.#set({ trial });
    this.#edited();
  }

  pick(picks: Partial<Picks>): void {
    this.#set({ picks: { ...this.#state.picks, ...picks } });
    this.#look(false);
  }

  /** Puts everything back to what was kept. */
  putBack(): void {
    dropDraft(this.siteId);
    this.#set({ document: this.#state.site!.site, trial: null, typed: {}, problems: [] });
    this.#hold();
  }

  /**
   * Saves what was typed and computes a revision from it.
   * @param kind judge the bank as it stands, or design one
   */
  async keep(kind: 'plan' | 'assess'): Promise<void> {
    this.#set({ saving: true, problems: [], fault: null });
    try {
      if (isChanged(this.#state)) await this.#save(kind);
      const path = `${this.#path}/${kind === 'plan' ? 'plans' : 'assessments'}`;
      const { body } = await ask<RevisionShown | { id: string }>(path, { method: 'POST', json: paperAsked() });
      this.#set({ offlineSince: null });
      if ('contentHash' in body) await this.#kept();
      else this.#follow(body.id);
    } catch (error) {
      await this.#hearSaving(error);
    }
    this.#set({ saving: false });
  }

  /** A meter file became a record: it is the one that is looked at from here on. */
  async recordAdded(): Promise<void> {
    await this.#refresh();
    this.#prepareEngine();
  }

  async cancelJob(): Promise<void> {
    await ask(`/api/jobs/${this.#state.job?.id}`, { method: 'DELETE' }).catch((error) => this.#hear(error));
  }

  /** Of two versions: the other window's is taken, or this one goes on, built on theirs. */
  settle(whose: 'theirs' | 'mine'): void {
    const { theirs } = this.#state;
    if (theirs === null) return;
    if (whose === 'theirs') dropDraft(this.siteId);
    const taken = { document: theirs.site, trial: null, typed: {} };
    this.#set({ site: theirs, theirs: null, ...(whose === 'theirs' ? taken : {}) });
    this.#edited();
    this.#hold();
  }

  readonly trace = (): Promise<Trace> | null => this.#engine?.trace() ?? null;

  async #save(kind: 'plan' | 'assess'): Promise<void> {
    const body = await saveDocument(this.#path, this.#state, kind);
    dropDraft(this.siteId);
    this.#set({ site: body, document: body.site });
  }

  async #refresh(): Promise<void> {
    const kept = await fetchKept(this.#path);
    this.#set({ ...kept, offlineSince: null });
    if (kept.kept === null && kept.records.length > 0 && !this.#closed)
      setTimeout(() => this.#lookAgain(), FIRST_PLAN_MS);
  }

  #lookAgain(): void {
    const { job, kept } = this.#state;
    if (this.#closed || job !== null || kept !== null) return;
    this.#refreshThen(() => this.#state.kept !== null && this.#look(true));
  }

  async #kept(): Promise<void> {
    await this.#refresh();
    this.#set({ trial: null, job: null });
    this.#look(true);
  }

  #follow(jobId: string): void {
    this.#stopJob?.();
    this.#stopJob = followJob(this.siteId, jobId, {
      moved: (job) => this.#set({ job }),
      ended: (end) => void this.#ended(end),
    });
  }

  #refreshThen(work: () => void): void {
    this.#refresh().then(work, (error) => this.#hear(error));
  }

  async #ended(end: JobEnd): Promise<void> {
    this.#set({ job: null });
    if (end.state === 'failed' && end.error !== null)
      this.#set({ problems: end.error.problems, fault: end.error.detail });
    if (end.state === 'done') await this.#kept().catch((error) => this.#hear(error));
  }

  #hold(): void {
    const { document } = this.#state;
    fetchHeldPapers(document).then(
      (held) => {
        if (document?.papers !== this.#state.document?.papers) return; // another was chosen meanwhile
        this.#set({ held });
        this.#look(true);
      },
      (error) => this.#hear(error),
    );
  }

  #edited(): void {
    const { site, document, trial } = this.#state;
    keepDraft(this.siteId, { version: site!.version, document: document!, trial });
    this.#look(false);
  }

  #prepareEngine(): void {
    const record = this.#state.records[0];
    if (this.#closed || record === undefined || record.id === this.#engineRecord) return;
    this.#engine?.close();
    this.#engineRecord = record.id;
    const columnsUrl = `${this.#path}/records/${record.id}/columns`;
    const { timeZone } = this.#state.site!.site;
    this.#engine = new EngineDesk(
      { columnsUrl, summary: record.record, timeZone },
      {
        looked: (look, asked, tookMs) => this.#looked(look, asked, tookMs),
        firm: (firm, asked) => this.#firm(firm, asked),
        failed: (error) => this.#failed(error),
        unopened: (error) => this.#openAnew(error),
      },
    );
    this.#look(true);
  }

  /** The record did not come: it is asked for anew once the server answers, and its own fault said where it does. */
  #openAnew(error: Error): void {
    this.#engine?.close();
    this.#engine = null;
    this.#engineRecord = '';
    this.#refreshThen(() => {
      this.#failed(error);
      this.#connection.mendLater();
    });
  }

  #look(isFullOnly: boolean): void {
    if (this.#engine !== null) this.#engine.look(lookAsked(this.#state, this.#station), isFullOnly);
  }

  #looked(look: Look, asked: LookAsked, tookMs: number): void {
    if (look.depth === 'full') {
      this.#full = look;
      if (staleFrom(this.#state) !== null || this.#state.kept === null) void this.#engine?.firm(asked);
    }
    this.#set({
      look: mergedLook(look, this.#full),
      charts: { ...this.#state.charts, ...look.charts },
      fault: null,
      problems: [],
      ...(asked.depth === 'quick' ? { followedMs: tookMs } : {}),
    });
  }

  #firm(firm: Firmness, asked: LookAsked): void {
    if (this.#full === null || JSON.stringify(asked.document) !== JSON.stringify(studiedDocument(this.#state))) return;
    this.#full = { ...this.#full, result: { ...this.#full.result, ...firm } };
    this.#set({ look: this.#full });
  }

  #failed(error: Error): void {
    this.#set(error instanceof InputRefused ? { problems: error.problems } : { fault: error.message });
  }

  async #hearSaving(error: unknown): Promise<void> {
    if (error instanceof Refused && error.problem.status === 412) {
      const theirs = await ask<SiteShown>(this.#path).catch(() => null);
      if (theirs !== null) this.#set({ theirs: theirs.body });
      return;
    }
    this.#hear(error);
  }

  #hear(error: unknown): void {
    if (error instanceof NoConnection) {
      this.#set({ offlineSince: this.#state.offlineSince ?? clockNow() });
      if (this.#state.stage === 'open') this.#connection.mendLater();
      return;
    }
    if (!(error instanceof Refused)) throw error;
    const { problems, detail } = error.problem;
    this.#set({ problems, fault: problems.length === 0 ? detail : null });
  }

  #set(part: Partial<DeskState>): void {
    if (this.#closed) return;
    this.#state = { ...this.#state, ...part };
    for (const listener of this.#listeners) listener();
  }
}
