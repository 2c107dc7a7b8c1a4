import { useEffect, useState } from 'react';
import type { Trace } from '../desk/look.js';
import { useDesk } from '../desk/use-desk.js';

/** The columns of a record once the engine has them, null until then. */
export function useTrace(recordId: string | undefined): Trace | null {
  const { desk, state } = useDesk();
  const [found, setFound] = useState<{ recordId: string; trace: Trace } | null>(null);
  const isLooked = state.look !== null;
  const isFound = found !== null && found.recordId === recordId;
  // biome-ignore lint/correctness/useExhaustiveDependencies: a record just read has no engine until its first look
  useEffect(() => {
    let isCurrent = true;
    if (recordId !== undefined && !isFound)
      desk.trace()?.then(
        (trace) => isCurrent && setFound({ recordId, trace }),
        () => undefined, // the desk says why, and opens the record anew
      );
    return () => {
      isCurrent = false;
    };
  }, [desk, recordId, isLooked, isFound]);
  return isFound ? found.trace : null;
}
