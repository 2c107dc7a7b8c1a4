import { createContext, useContext, useSyncExternalStore } from 'react';
import type { DeskState } from './desk-state.js';
import type { SiteDesk } from './site-desk.js';

export const DeskContext = createContext<SiteDesk | null>(null);

/** The desk of the open site and its state, followed. */
export function useDesk(): { desk: SiteDesk; state: DeskState } {
  const desk = useContext(DeskContext);
  if (desk === null) throw new Error('no site is open');
  return { desk, state: useSyncExternalStore(desk.subscribe, desk.state) };
}

const never = () => () => undefined;
const nothing = () => null;

/** The state of the open site, followed; null on a page of none. */
export function useOpenSite(): DeskState | null {
  const desk = useContext(DeskContext);
  return useSyncExternalStore<DeskState | null>(desk?.subscribe ?? never, desk?.state ?? nothing);
}
