import { Simulation } from 'eecircuit-engine';

/** Magnitudes of every node voltage and branch current of a netlist, by the simulator's lower-case names. */
export type Magnitudes = ReadonlyMap<string, number>;

/** A general-purpose circuit simulator, started once; one run at a time. */
export class CircuitSimulator {
  readonly #simulation = new Simulation();

  /** Loads the simulator. */
  async start(): Promise<void> {
    await this.#simulation.start();
  }

  /**
   * Alternating-current analysis at one frequency.
   * @param elements lines of the netlist without title and end
   * @param frequencyHz f [Hz]
   * @returns magnitudes of all voltages and currents
   */
  async magnitudes(elements: readonly string[], frequencyHz: number): Promise<Magnitudes> {
    const lines = ['* network at one order', ...elements, `.ac lin 1 ${frequencyHz} ${frequencyHz}`, '.end'];
    this.#simulation.setNetList(lines.join('\n'));
    const result = await this.#simulation.runSim();
    const bad = this.#simulation.getError().filter((line) => /error|singular/i.test(line));
    if (bad.length > 0 || result.dataType !== 'complex') throw new Error(bad.join('\n') || 'no complex result');
    return new Map(
      result.data.map(({ name, values }) => {
        const value = values[0];
        if (value === undefined) throw new Error(`nothing at ${name}`);
        return [name, Math.hypot(value.real, value.img)];
      }),
    );
  }
}
