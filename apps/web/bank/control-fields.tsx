import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { QuantityField } from '../field/quantity-field.js';
import { latestResult } from '../line/latest-result.js';

/** How the controller works. */
export function ControlFields() {
  const { state } = useDesk();
  const control = latestResult(state)?.control;
  const taken = (text: string | undefined) => (text === undefined ? undefined : `${text}, taken`);
  return (
    <section className="section" aria-labelledby="control">
      <h2 id="control">How the controller works</h2>
      <div className="fields">
        <QuantityField
          path="control.setPointPowerFactor"
          label="set point"
          otherwise={taken(control && formatNumber(control.setPointPowerFactor, 'given'))}
        />
        <ChoiceField
          path="control.mode"
          label="choice of stages"
          otherwise="nearest level, taken"
          choices={[
            ['nearestLevel', 'nearest level'],
            ['oneByOne', 'one by one'],
          ]}
        />
        <QuantityField
          path="control.responseRatio"
          label="response, of the smallest"
          otherwise={taken(control && formatNumber(control.responseRatio, 'given'))}
        />
        <QuantityField
          path="control.stepDelayS"
          label="step delay"
          unit="s"
          otherwise={taken(control && formatNumber(control.stepDelayS, 'given'))}
        />
        <QuantityField
          path="control.reconnectDelayS"
          label="reconnection delay"
          unit="s"
          otherwise={taken(control && formatQuantity(control.reconnectDelayS, '', 'computed'))}
        />
        <ChoiceField
          path="control.wear"
          label="equal stages"
          otherwise="by turns, taken"
          choices={[
            ['even', 'by turns'],
            ['inOrder', 'in order'],
          ]}
        />
      </div>
    </section>
  );
}
