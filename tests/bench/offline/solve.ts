import highsLoader, { type Highs } from 'highs';

/** One column of a model: what it costs, its bounds, its rows with their coefficients. */
export interface Column {
  cost: number;
  upper: number;
  whole: boolean;
  rows: [row: number, by: number][];
}

export interface Milp {
  sense: 'minimize' | 'maximize';
  columns: Column[];
  /** Row activities: least and most; null: open. */
  rows: { least: number | null; most: number | null }[];
  /** A plan that is known, by the values of its columns. */
  known: number[] | null;
}

export interface Bounded {
  /** No solution is better than this. */
  bound: number;
  /** The best the solver found, or was given; null: none. */
  found: number | null;
  seconds: number;
  finished: boolean;
}

let loaded: Promise<Highs> | null = null;

/** Solves with HiGHS until it is done to `gap` or `seconds` are over. */
export async function solveMilp(milp: Milp, seconds: number, gap: number): Promise<Bounded> {
  const highs = await (loaded ??= highsLoader());
  const { columns, rows, sense, known } = milp;
  const starts = new Int32Array(columns.length + 1);
  columns.forEach((one, at) => (starts[at + 1] = starts[at]! + one.rows.length));
  const { infinity, constants } = highs;
  return highs.withModel(
    {
      numCols: columns.length,
      numRows: rows.length,
      sense: constants.objectiveSense[sense],
      colCost: Float64Array.from(columns, ({ cost }) => cost),
      colLower: new Float64Array(columns.length),
      colUpper: Float64Array.from(columns, ({ upper }) => upper),
      rowLower: Float64Array.from(rows, ({ least }) => least ?? -infinity),
      rowUpper: Float64Array.from(rows, ({ most }) => most ?? infinity),
      matrix: {
        format: 'csc',
        numRows: rows.length,
        numCols: columns.length,
        starts,
        indices: Int32Array.from(columns.flatMap((one) => one.rows.map(([row]) => row))),
        values: Float64Array.from(columns.flatMap((one) => one.rows.map(([, by]) => by))),
      },
      integrality: Int32Array.from(columns, ({ whole }) => (whole ? 1 : 0)),
    },
    (model) => {
      model.options.set({ output_flag: false, time_limit: seconds, mip_rel_gap: gap });
      if (known) model.setSolution({ colValue: Float64Array.from(known) });
      const start = performance.now();
      model.run();
      const took = (performance.now() - start) / 1000;
      const found = Number(model.info.get('primal_solution_status')) === 2 ? model.getObjectiveValue() : null;
      const finished = model.getModelStatus() === constants.modelStatus.optimal;
      return { bound: Number(model.info.get('mip_dual_bound')), found, seconds: took, finished };
    },
  );
}
