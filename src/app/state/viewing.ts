/** Columns of the cells table that it can be sorted by. */
export type CellColumn = "cell" | "from" | "followed" | "speed" | "straightness" | "motile" | "counted";

/** How one trial is being looked at. */
export interface Viewing {
  /** Frames there are; 0 until the recording is open. */
  readonly frames: number;
  readonly frame: number;
  readonly playing: boolean;
  /** Speed of playing against true time: 1, or slower. */
  readonly rate: number;
  /** Chosen cell as index of its path; null when none is. */
  readonly cell: number | null;
  /** The finding whose evidence is shown, by its name; null when none is. */
  readonly evidence: string | null;
  readonly sort: { readonly by: CellColumn; readonly falling: boolean };
  readonly sightings: boolean;
  readonly paths: boolean;
  /** How much of each path is drawn behind its cell, seconds; null for all of it. */
  readonly tail_s: number | null;
}

export const rates = [1, 0.5, 0.25, 0.1] as const;
export const tails_s = [0.5, 1, 3, null] as const;

export const firstLook: Viewing = {
  frames: 0,
  frame: 0,
  playing: false,
  rate: 1,
  cell: null,
  evidence: null,
  sort: { by: "cell", falling: false },
  sightings: true,
  paths: true,
  tail_s: 1,
};

export type ViewingAction =
  | { readonly type: "counted"; readonly frames: number }
  /** By hand, which pauses; `played` is the film going on by itself. */
  | { readonly type: "went"; readonly frame: number }
  | { readonly type: "stepped"; readonly by: number }
  | { readonly type: "played"; readonly frame: number }
  | { readonly type: "play toggled" }
  | { readonly type: "rate chosen"; readonly rate: number }
  | { readonly type: "cell chosen"; readonly cell: number | null; readonly frame?: number }
  | { readonly type: "evidence toggled"; readonly finding: string }
  | { readonly type: "evidence put away" }
  | { readonly type: "sorted"; readonly by: CellColumn }
  | { readonly type: "layer toggled"; readonly layer: "sightings" | "paths" }
  | { readonly type: "tail chosen"; readonly tail_s: number | null };

/** What becomes of the look at a trial. Pure. */
export function viewingReducer(view: Viewing, action: ViewingAction): Viewing {
  const inside = (frame: number) => Math.max(0, Math.min(view.frames - 1, Math.round(frame)));
  switch (action.type) {
    case "counted":
      return { ...view, frames: action.frames, frame: Math.max(0, Math.min(action.frames - 1, view.frame)) };
    case "went":
      return { ...view, playing: false, frame: inside(action.frame) };
    case "stepped":
      return { ...view, playing: false, frame: inside(view.frame + action.by) };
    case "played": {
      const frame = inside(action.frame);
      return { ...view, frame, playing: frame < view.frames - 1 };
    }
    case "play toggled": {
      const atEnd = view.frame >= view.frames - 1;
      if (view.frames < 2) return view;
      return { ...view, playing: !view.playing, frame: !view.playing && atEnd ? 0 : view.frame };
    }
    case "rate chosen":
      return { ...view, rate: action.rate };
    case "cell chosen": {
      if (action.frame === undefined) return { ...view, cell: action.cell };
      return { ...view, cell: action.cell, playing: false, frame: inside(action.frame) };
    }
    case "evidence toggled":
      return { ...view, evidence: view.evidence === action.finding ? null : action.finding };
    case "evidence put away":
      return { ...view, evidence: null, cell: null };
    case "sorted":
      return {
        ...view,
        sort: { by: action.by, falling: view.sort.by === action.by ? !view.sort.falling : action.by === "speed" },
      };
    case "layer toggled":
      return { ...view, [action.layer]: !view[action.layer] };
    case "tail chosen":
      return { ...view, tail_s: action.tail_s };
  }
}
