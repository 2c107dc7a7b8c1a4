import { type ResultType, Simulation } from 'eecircuit-engine';

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
   * @param wanted voltages and currents to keep, by their names; all where absent, which is slow for large circuits
   * @returns magnitudes
   */
  async magnitudes(
    elements: readonly string[],
    frequencyHz: number,
    wanted: readonly string[] = [],
  ): Promise<Magnitudes> {
    const kept = wanted.map((name) => `.save ${name}`);
    const lines = ['* network at one order', ...elements, ...kept, `.ac lin 1 ${frequencyHz} ${frequencyHz}`, '.end'];
    return magnitudesOf(await this.#run(lines.join('\n')), 0);
  }

  /**
   * Runs a whole netlist with its own analysis of alternating current.
   * @param netlist text from title to end
   * @returns frequency [Hz] and magnitudes at each point
   */
  async sweep(netlist: string): Promise<{ frequencyHz: number; magnitudes: Magnitudes }[]> {
    const result = await this.#run(netlist);
    return Array.from({ length: result.numPoints }, (_, point) => {
      const magnitudes = magnitudesOf(result, point);
      return { frequencyHz: magnitudes.get('frequency')!, magnitudes };
    });
  }

  /**
   * Runs a whole netlist with its own transient analysis.
   * @param netlist text from title to end
   * @param name a voltage or current
   * @returns its greatest magnitude and when that was
   */
  async greatest(netlist: string, name: string): Promise<{ value: number; timeS: number }> {
    const result = await this.#run(netlist);
    if (result.dataType !== 'real') throw new Error('no transient');
    const column = (wanted: string): number[] => {
      const found = result.data.find((each) => each.name === wanted);
      if (found === undefined) throw new Error(`no ${wanted} among ${result.data.map((each) => each.name)}`);
      return found.values;
    };
    const times = column('time');
    return column(name).reduce(
      (best, value, k) => (Math.abs(value) > best.value ? { value: Math.abs(value), timeS: times[k]! } : best),
      { value: 0, timeS: 0 },
    );
  }

  async #run(netlist: string): Promise<ResultType> {
    this.#simulation.setNetList(netlist);
    const result = await this.#simulation.runSim();
    const bad = this.#simulation.getError().filter((line) => /error|singular|failed/i.test(line));
    if (bad.length > 0) throw new Error(bad.join('\n'));
    return result;
  }
}

function magnitudesOf(result: ResultType, point: number): Magnitudes {
  if (result.dataType !== 'complex') throw new Error('no complex result');
  return new Map(
    result.data.map(({ name, values }) => {
      const value = values[point];
      if (value === undefined) throw new Error(`nothing at ${name}`);
      return [name, Math.hypot(value.real, value.img)];
    }),
  );
}
