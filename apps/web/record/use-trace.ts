import { useEffect, useState } from 'react';
import type { Trace } from '../desk/look.js';
import { useDesk } from '../desk/use-desk.js';

/** The columns of a record once the engine has them, null until then. */
export function useTrace(recordId: string | undefined): Trace | null {
  const { desk } = useDesk();
  const [found, setFound] = useState<{ recordId: string; trace: Trace } | null>(null);
  useEffect(() => {
    let isCurrent = true;
    if (recordId !== undefined) void desk.trace()?.then((trace) => isCurrent && setFound({ recordId, trace }));
    return () => {
      isCurrent = false;
    };
  }, [desk, recordId]);
  return found !== null && found.recordId === recordId ? found.trace : null;
}
