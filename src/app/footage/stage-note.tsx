import type { Pictures } from "./use-pictures.ts";

/** What the stage says while it has no picture. */
export function StageNote({ pictures, hasBackground }: { pictures: Pictures; hasBackground: boolean }) {
  const { picture, problem } = pictures;
  if (picture?.bitmap) return null;
  if (picture) return <p className="stage-note">Frame {picture.frame + 1} can’t be decoded.</p>;
  if (!problem) return <p className="stage-note">Opening the recording …</p>;
  return (
    <div className={hasBackground ? "stage-note at-top" : "stage-note"} role="alert">
      <p>
        <strong>{problem.title}.</strong> {problem.what}
      </p>
      <p>{hasBackground ? "The still background is shown in their place." : problem.remedy}</p>
    </div>
  );
}
