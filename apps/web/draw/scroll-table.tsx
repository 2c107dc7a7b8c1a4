import type { ReactNode } from 'react';

/** A table wider than a narrow window: it scrolls within itself, by keyboard too. */
export function ScrollTable({
  name,
  look = 'table',
  children,
}: {
  name: string;
  look?: 'table' | 'table restacked' | 'map';
  children: ReactNode;
}) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reached by keyboard
    <section className={look} tabIndex={0} aria-label={name}>
      <table>{children}</table>
    </section>
  );
}
