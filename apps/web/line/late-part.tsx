import { type ComponentType, lazy, type ReactNode, Suspense, useEffect, useState } from 'react';
import { Head } from './head.js';

/** A script that did not come is asked for again after a while [ms]. */
const AGAIN_MS = 2000;
/** A page is not loaded anew for its sake twice within this [ms]. */
const RELOAD_EVERY_MS = 60_000;
const RELOADED = 'varwright:reloaded';
/** What is on its way for longer than this is said [ms]. */
const SOON_MS = 1500;

/** A part of the page that is loaded when it is first shown, and asked for until it comes. */
export function latePart<Props>(load: () => Promise<ComponentType<Props>>) {
  return lazy(async () => ({ default: await untilLoaded(load) }));
}

/** Stands where a late part will be; without a connection it says so. */
export function PartAwaited({
  name,
  isPage = false,
  children,
}: {
  name: string;
  /** the part is the whole page, its head included */
  isPage?: boolean;
  children: ReactNode;
}) {
  const awaited = <Awaited name={name} />;
  return <Suspense fallback={isPage ? <BarePage>{awaited}</BarePage> : awaited}>{children}</Suspense>;
}

/** A page that holds a few words alone, headed as every page is. */
export function BarePage({ children }: { children: ReactNode }) {
  return (
    <div className="sheet">
      <Head />
      <div className="sites-line" />
      <main className="bare">{children}</main>
    </div>
  );
}

function Awaited({ name }: { name: string }) {
  const [isLate, setLate] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLate(true), SOON_MS);
    return () => clearTimeout(timer);
  }, []);
  return (
    <>
      <h1>{name}</h1>
      <p role="status">
        {isLate ? 'Not loaded yet: the server does not answer. It goes on by itself once it does.' : ''}
      </p>
    </>
  );
}

async function untilLoaded<Props>(load: () => Promise<ComponentType<Props>>): Promise<ComponentType<Props>> {
  for (;;) {
    try {
      return await load();
    } catch {
      await new Promise((resolve) => setTimeout(resolve, AGAIN_MS));
      if (await isAnswering()) return load().catch(loadPageAnew);
    }
  }
}

async function isAnswering(): Promise<boolean> {
  return fetch('/', { method: 'HEAD' }).then(
    () => true,
    () => false,
  );
}

/** The server answers and the script still does not come: another version is served, or the browser keeps the failure. */
function loadPageAnew(error: unknown): Promise<never> {
  const last = Number(sessionStorage.getItem(RELOADED) ?? 0);
  if (Date.now() - last < RELOAD_EVERY_MS) throw error;
  sessionStorage.setItem(RELOADED, String(Date.now()));
  location.reload();
  return new Promise(() => undefined);
}
