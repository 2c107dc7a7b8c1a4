import { useCallback, useEffect, useState } from 'react';
import { ask, NoConnection } from '../api/ask.js';
import type { PaperShown } from '../api/shown.js';

/** Every version of every shared paper, loaded once and again when asked. */
export function usePapers() {
  const [papers, setPapers] = useState<PaperShown[] | null>(null);
  const [failure, setFailure] = useState('');
  const reload = useCallback(async () => {
    try {
      setPapers((await ask<{ papers: PaperShown[] }>('/api/papers')).body.papers);
      setFailure('');
    } catch (error) {
      setFailure(error instanceof NoConnection ? 'No connection' : (error as Error).message);
    }
  }, []);
  useEffect(() => void reload(), [reload]);
  return { papers, failure, reload };
}
