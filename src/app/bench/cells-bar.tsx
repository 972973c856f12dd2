interface CellsBarProps {
  readonly all: number;
  /** How many rest behind the chosen finding; null when none is chosen. */
  readonly shown: number | null;
  readonly showAll: () => void;
}

/** Which cells the table lists. */
export function CellsBar({ all, shown, showAll }: CellsBarProps) {
  return (
    <header>
      <h2>Cells</h2>
      <p>{shown === null ? `all ${all}` : `${shown} of ${all} behind the finding`}</p>
      {shown !== null && (
        <button type="button" className="quiet" onClick={showAll} title="Show all cells (Esc)">
          Show all
        </button>
      )}
    </header>
  );
}
