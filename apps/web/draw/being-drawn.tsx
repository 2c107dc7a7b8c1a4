/** Stands where a station's pictures will be, until the engine has drawn them. */
export function BeingDrawn() {
  return (
    <section className="section" aria-busy="true">
      <p className="caption" role="status">
        The engine draws the pictures of this station from the record; the figures above are those that were kept.
      </p>
    </section>
  );
}
