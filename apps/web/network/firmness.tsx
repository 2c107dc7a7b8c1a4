import { FIRMNESS_HEADS, firmnessFinding, firmnessRows } from '#libs/present/firmness.js';
import { useDesk } from '../desk/use-desk.js';
import { ScrollTable } from '../draw/scroll-table.js';
import { latestResult } from '../line/latest-result.js';

/** How far each uncertain quantity may move before the verdict does. */
export function Firmness() {
  const { state } = useDesk();
  const robustness = latestResult(state)?.robustness ?? null;
  if (robustness === null) return null;
  return (
    <section className="section" aria-labelledby="firmness">
      <h2 id="firmness">{firmnessFinding(robustness)}</h2>
      <p className="caption">Each quantity moved by itself, times its own value, until the verdict is another one.</p>
      <ScrollTable name="How firm the verdict is">
        <thead>
          <tr>
            {FIRMNESS_HEADS.map((head) => (
              <th key={head} scope="col">
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {firmnessRows(robustness).map(([quantity, down, up]) => (
            <tr key={quantity}>
              <th scope="row">{quantity}</th>
              <td>{down}</td>
              <td>{up}</td>
            </tr>
          ))}
        </tbody>
      </ScrollTable>
    </section>
  );
}
