import { QuantityField } from '../field/quantity-field.js';
import { QuantityListField } from '../field/quantity-list-field.js';
import { TickField } from '../field/tick-field.js';

/** What a bank may be built from: a design chooses among these alone. */
export function CatalogueFields() {
  return (
    <section className="section" aria-labelledby="catalogue">
      <h2 id="catalogue">What can be bought</h2>
      <p className="caption">A design chooses among these. What is left empty takes the customary.</p>
      <div className="fields" id="field:catalogue" tabIndex={-1}>
        <QuantityListField path="catalogue.stageKvar" label="stages" unit="kvar" otherwise="any size" />
        <QuantityListField path="catalogue.ratedV" label="capacitors" unit="V" otherwise="the common" />
        <QuantityListField path="catalogue.reactorPct" label="reactors" unit="%" otherwise="the common" />
        <QuantityField path="catalogue.maxStages" label="stages at most" otherwise="no more than needed" />
        <QuantityField path="catalogue.maxTotalKvar" label="bank at most" unit="kvar" otherwise="the need" />
        <QuantityField path="catalogue.interStageUh" label="between stages" unit="µH" otherwise="2, assumed" />
      </div>
      <p className="row gap">
        <TickField path="catalogue.evenSteps" label="levels no further apart than the smallest stage" otherwise />
        <TickField
          path="catalogue.mustMeetTarget"
          label="the target holds in every month, whatever it costs"
          otherwise
        />
      </p>
    </section>
  );
}
