import { useSyncExternalStore } from 'react';
import { flushSync } from 'react-dom';

/** What a figure may be wide on paper: A4 between its margins, a little less than Letter [px]. */
export const PAPER_WIDTH_PX = 700;

const listeners = new Set<() => void>();
let isOn = false;

/** Follows the browser on its way to the printer and back; what is drawn for paper is drawn before it looks. */
export function followPrinting(): void {
  const turn = (to: boolean) => () => {
    isOn = to;
    document.documentElement.toggleAttribute('data-paper', to);
    flushSync(() => {
      for (const listener of listeners) listener();
    });
  };
  window.addEventListener('beforeprint', turn(true));
  window.addEventListener('afterprint', turn(false));
}

/** Whether the page is being put on paper. */
export function useOnPaper(): boolean {
  return useSyncExternalStore(
    (changed) => {
      listeners.add(changed);
      return () => listeners.delete(changed);
    },
    () => isOn,
  );
}
