import type {
  DriftFinding,
  Interval,
  MeasuredTrial,
  QualityCheck,
  SourceFacts,
  SpeedFinding,
} from "../quantities/index.ts";
import { countCells } from "./cell-counts.ts";
import { asJson, type Json, roundedJson } from "./json.ts";

/**
 * The content of `summary.json`: every figure of the trial with its interval, in the order of the contract.
 *
 * Numbers are rounded to eight significant digits, but for `settings`, which must run the measurement again as it
 * was. Blocks for which the trial has nothing are null. Without a scale every `_um` figure is null and the `_px`
 * figures beside them hold.
 * @throws Error when a number is not finite or two quality checks share a name.
 */
export function summaryOf(measured: MeasuredTrial): { readonly [name: string]: Json } {
  const um_per_px = measured.scale?.um_per_px ?? null;
  const figures = roundedJson({
    source: sourceBlock(measured.source),
    scale: measured.scale && {
      um_per_px: measured.scale.um_per_px,
      uncertainty_um_per_px: measured.scale.uncertainty_um_per_px,
      from: measured.scale.from,
    },
    cells: cellsBlock(measured),
    speed: measured.speed && speedBlock(measured.speed, um_per_px),
    drift: measured.drift && driftBlock(measured.drift, um_per_px),
    quality: qualityBlock(measured.quality),
  }) as { readonly [name: string]: Json };
  return {
    schema: "lodewake/summary@1",
    trial: measured.trial,
    strain: measured.strain,
    culture: measured.culture,
    condition: measured.condition,
    source: figures.source!,
    settings: asJson(measured.settings),
    tool: { name: measured.tool.name, version: measured.tool.version },
    scale: figures.scale!,
    cells: figures.cells!,
    speed: figures.speed!,
    alignment: null,
    turns: null,
    rotation: null,
    drift: figures.drift!,
    front: null,
    quality: figures.quality!,
    warnings: measured.warnings.map(({ code, message }) => ({ code, message })),
  };
}

function sourceBlock(source: SourceFacts): Json {
  return {
    recording: source.recording,
    sha256: source.sha256,
    frames: source.frames,
    duration_s: source.duration_s,
    fps_median: source.fps_median,
    width_px: source.width_px,
    height_px: source.height_px,
    decoder: source.decoder,
    container: source.container,
    codec: source.codec,
    rotation_deg: source.rotation_deg,
    time_factor: source.timeFactor,
    time_factor_from: source.timeFactorFrom,
    frames_expected: source.framesExpected,
  };
}

function cellsBlock(measured: MeasuredTrial): Json {
  const { paths, motile, notMotile, undecided, kept, setAside } = countCells(measured.cells);
  return {
    n_paths: paths,
    n_motile: motile,
    n_not_motile: notMotile,
    n_undecided: undecided,
    n_kept: kept,
    not_kept: setAside.map(({ reason, count }) => ({ reason, n_cells: count })),
  };
}

function speedBlock(speed: SpeedFinding, um_per_px: number | null): Json {
  const um = (px: number | null) => (px === null || um_per_px === null ? null : px * um_per_px);
  return {
    mean_um_s: speed.mean_um_s?.value ?? null,
    ci95_um_s: speed.mean_um_s ? pair(speed.mean_um_s.ci95) : null,
    median_um_s: um(speed.median_px_s),
    sd_um_s: um(speed.sd_px_s),
    n_cells: speed.n_cells,
    motile_fraction: speed.motile_fraction,
    ci95_motile_fraction: speed.ci95_motile_fraction && pair(speed.ci95_motile_fraction),
    n_judged: speed.n_judged,
    mean_px_s: speed.mean_px_s?.value ?? null,
    ci95_px_s: speed.mean_px_s ? pair(speed.mean_px_s.ci95) : null,
    median_px_s: speed.median_px_s,
    sd_px_s: speed.sd_px_s,
  };
}

function driftBlock(drift: DriftFinding, um_per_px: number | null): Json {
  const [vx, vy] = drift.velocity_px_s;
  const [x, y] = drift.ci95_px_s;
  const scaled = ([low, high]: Interval, by: number) => [low * by, high * by];
  return {
    velocity_um_s: um_per_px === null ? null : [vx * um_per_px, vy * um_per_px],
    ci95_um_s: um_per_px === null ? null : [scaled(x, um_per_px), scaled(y, um_per_px)],
    velocity_px_s: [vx, vy],
    ci95_px_s: [pair(x), pair(y)],
    n_cells: drift.n_cells,
    from: drift.from,
  };
}

function qualityBlock(checks: readonly QualityCheck[]): Json {
  const block: Record<string, Json> = {};
  for (const { check, figure, unit, verdict, advice } of checks) {
    if (Object.hasOwn(block, check)) throw new Error(`two quality checks are called ${check}`);
    block[check] = { figure, unit, verdict, advice };
  }
  return block;
}

function pair([low, high]: Interval): Json {
  return [low, high];
}
