import { useCallback, useEffect, useRef, useState } from 'react';
import { ask } from '../api/ask.js';

/** So long a deleted site can be had back [ms]. */
const UNDO_MS = 10_000;

/** Deleting with a way back: the site leaves the list at once, and the server when the way back closes. */
export function useDeletion(reload: () => Promise<void>) {
  const [gone, setGone] = useState<ReadonlySet<string>>(new Set());
  const [pending, setPending] = useState<string | null>(null);
  const waiting = useRef<{ id: string; timer: ReturnType<typeof setTimeout> } | null>(null);
  const finish = useCallback(async () => {
    const { current } = waiting;
    if (current === null) return;
    clearTimeout(current.timer);
    waiting.current = null;
    setPending(null);
    await ask(`/api/sites/${current.id}`, { method: 'DELETE', keepalive: true }).catch(() => setGone(new Set()));
    await reload();
  }, [reload]);
  useEffect(() => {
    const leave = () => void finish();
    window.addEventListener('pagehide', leave);
    return () => {
      window.removeEventListener('pagehide', leave);
      leave();
    };
  }, [finish]);
  const remove = (id: string) => {
    void finish();
    waiting.current = { id, timer: setTimeout(() => void finish(), UNDO_MS) };
    setGone(new Set([...gone, id]));
    setPending(id);
  };
  const undo = () => {
    const { current } = waiting;
    if (current === null) return;
    clearTimeout(current.timer);
    waiting.current = null;
    setPending(null);
    setGone(new Set([...gone].filter((id) => id !== current.id)));
  };
  return { gone, pending, remove, undo };
}
