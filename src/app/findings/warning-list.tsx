import type { Warning } from "../../quantities/index.ts";

/** What a reader of the findings must know before using them. */
export function WarningList({ warnings }: { warnings: readonly Warning[] }) {
  if (warnings.length === 0) return null;
  return (
    <section className="warnings">
      <h3>{warnings.length === 1 ? "One warning" : `${warnings.length} warnings`}</h3>
      <ul>
        {warnings.map(({ code, message }) => (
          <li key={code + message}>{message}</li>
        ))}
      </ul>
    </section>
  );
}
