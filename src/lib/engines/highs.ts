import loader, { type Highs, type Model } from 'highs';
import type {
	LpAnswer,
	LpColumn,
	LpEngine,
	LpMaster,
	MipAnswer,
	MipLimits,
	MipModel,
	RowBounds
} from '../domain/solver/engine';

/**
 * HiGHS as the solver's engine: warm linear programmes and whole-number programmes. Synchronous and
 * single-threaded, so it belongs in a worker or a command, never on the web thread.
 * @param wasm the compiled library, where it cannot be found beside its script (a browser bundle)
 */
export async function loadHighs(wasm?: ArrayBuffer): Promise<LpEngine> {
	const highs = await loader({
		print: () => {},
		printErr: () => {},
		...(wasm ? { wasmBinary: wasm } : {})
	});
	return {
		openMaster: (rows) => openMaster(highs, rows),
		solveMip: (model, limits) => solveMip(highs, model, limits)
	};
}

const FAILED: LpAnswer = {
	optimal: false,
	objective: NaN,
	values: new Float64Array(0),
	duals: new Float64Array(0)
};

function openMaster(highs: Highs, rows: readonly RowBounds[]): LpMaster {
	const model = highs.createModel();
	model.options.set({ output_flag: false, presolve: 'off' });
	for (const row of rows) model.addRow(row.lower, row.upper, { indices: [], values: [] });
	return {
		addColumns: (columns) => addColumns(model, columns),
		setRow: (row, { lower, upper }) => void model.changeRowBounds(row, lower, upper),
		setUpper: (column, upper) => void model.changeColBounds(column, 0, upper),
		solve: (timeLimitMs) => solveLp(highs, model, timeLimitMs),
		dispose: () => model.dispose()
	};
}

function addColumns(model: Model, columns: readonly LpColumn[]): void {
	if (columns.length === 0) return;
	const starts = [0];
	for (const column of columns) starts.push(starts[starts.length - 1]! + column.rows.length);
	model.addCols({
		cost: Float64Array.from(columns, (column) => column.cost),
		lower: new Float64Array(columns.length),
		upper: Float64Array.from(columns, (column) => column.upper),
		matrix: {
			format: 'csc',
			numRows: model.getDimensions().numRows,
			numCols: columns.length,
			starts: Int32Array.from(starts),
			indices: Int32Array.from(columns.flatMap((column) => column.rows)),
			values: Float64Array.from(columns.flatMap((column) => column.values))
		}
	});
}

function solveLp(highs: Highs, model: Model, timeLimitMs: number): LpAnswer {
	try {
		// The limit counts from the first run of this model.
		model.options.set('time_limit', model.getRunTime() + Math.max(1, timeLimitMs) / 1000);
		const { modelStatus } = model.run();
		const { colValue, rowDual } = model.getSolution();
		return {
			optimal: modelStatus === highs.constants.modelStatus.optimal,
			objective: model.getObjectiveValue(),
			values: colValue,
			duals: rowDual
		};
	} catch {
		return FAILED;
	}
}

function solveMip(highs: Highs, mip: MipModel, limits: MipLimits): MipAnswer {
	try {
		return highs.withModel((model) => runMip(highs, model, mip, limits));
	} catch {
		return { status: 'failed', values: null, objective: NaN, bound: -Infinity };
	}
}

function runMip(highs: Highs, model: Model, mip: MipModel, limits: MipLimits): MipAnswer {
	model.options.set({
		output_flag: false,
		time_limit: Math.max(1, limits.timeLimitMs) / 1000,
		random_seed: limits.seed ?? 0,
		mip_allow_restart: false,
		mip_heuristic_run_rins: false,
		mip_heuristic_run_rens: false,
		mip_rel_gap: 0,
		mip_abs_gap: 1e-6
	});
	if (limits.target !== undefined) model.options.set('objective_target', limits.target);
	if (limits.maxNodes !== undefined) model.options.set('mip_max_nodes', limits.maxNodes);
	for (const row of mip.rows) model.addRow(row.lower, row.upper, { indices: [], values: [] });
	addColumns(model, mip.columns);
	const integer = Int32Array.from(mip.columns, () => highs.constants.variableType.integer);
	model.changeColsIntegrality({ kind: 'range', from: 0, to: mip.columns.length - 1 }, integer);
	if (limits.start) model.setSolution({ colValue: Float64Array.from(limits.start) });
	const { modelStatus } = model.run({
		[highs.constants.callbackType.mipInterrupt]: (event: { interrupt(): void }) => {
			if (limits.shouldStop?.()) event.interrupt();
		}
	});
	return readMip(highs, model, modelStatus);
}

function readMip(highs: Highs, model: Model, status: number): MipAnswer {
	const { modelStatus, solutionStatus } = highs.constants;
	const found = model.info.get('primal_solution_status') === solutionStatus.feasible;
	const values = found ? Array.from(model.getSolution().colValue, Math.round) : null;
	const ended =
		status === modelStatus.optimal
			? 'optimal'
			: status === modelStatus.infeasible
				? 'infeasible'
				: 'limit';
	return {
		status: ended,
		values,
		objective: found ? model.getObjectiveValue() : NaN,
		bound: Number(model.info.get('mip_dual_bound'))
	};
}
