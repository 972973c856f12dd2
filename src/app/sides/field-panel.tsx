import type { FieldDescription } from "../../trial/index.ts";
import { Needle } from "../chrome/needle.tsx";
import { fieldAt } from "../ribbon/field-over-time.ts";
import "./sides.css";

/** The field that acted, step by step. */
export function FieldPanel({ field }: { field: FieldDescription | null }) {
  if (!field) {
    return (
      <p>
        This trial says nothing about a field. Describe it in <code>trial.json</code> as steps: a time, a magnitude in
        mT, and a direction in degrees counter-clockwise from the right of the picture.
      </p>
    );
  }
  if (field.from === "log") {
    return (
      <p>
        The field is logged in <b>{field.file}</b>. This version keeps the reference and does not read the log.
      </p>
    );
  }
  const [ax, ay] = field.ambient_mT;
  return (
    <>
      <table className="steps">
        <caption>Net field in the picture plane. The filled half of a needle points along it.</caption>
        <thead>
          <tr>
            <th scope="col">From</th>
            <th scope="col">Field</th>
            <th scope="col">Direction</th>
          </tr>
        </thead>
        <tbody>
          {field.steps.map(({ t_s }) => {
            const { magnitude_mT, angle_deg } = fieldAt(field, t_s);
            return (
              <tr key={t_s}>
                <td>{t_s} s</td>
                <td>{Number(magnitude_mT.toPrecision(4))} mT</td>
                <td>
                  <Needle angle_deg={angle_deg} size={26} />
                  {Math.round(angle_deg)}°
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
      {field.rotation_hz !== 0 && (
        <p>
          It turns {field.rotation_hz > 0 ? "counter-clockwise" : "clockwise"} at {Math.abs(field.rotation_hz)} Hz.
        </p>
      )}
      {(ax !== 0 || ay !== 0) && (
        <p>
          The ambient field of {ax} mT to the right and {ay} mT upwards is part of it.
        </p>
      )}
      <p className="small-print">
        Coils under current get hot, and strong magnets pinch. Follow your laboratory’s rules.
      </p>
    </>
  );
}
