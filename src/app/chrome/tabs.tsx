import { type KeyboardEvent, type ReactNode, useId, useState } from "react";
import "./tabs.css";

export interface Tab {
  readonly name: string;
  /** A short word beside the name: `1 poor`. */
  readonly note?: string | undefined;
  readonly content: ReactNode;
  /** What stays in sight below the panel while this tab is chosen. */
  readonly below?: ReactNode;
}

/** Tabs over one panel. Arrow keys, Home and End go from tab to tab. */
export function Tabs({ label, tabs }: { label: string; tabs: readonly Tab[] }) {
  const id = useId();
  const [chosen, setChosen] = useState(0);
  const press = (event: KeyboardEvent<HTMLDivElement>) => {
    const by = { ArrowRight: chosen + 1, ArrowLeft: chosen - 1, Home: 0, End: -1 }[event.key];
    if (by === undefined) return;
    event.preventDefault();
    const next = (by + tabs.length) % tabs.length;
    setChosen(next);
    event.currentTarget.querySelectorAll<HTMLElement>("[role=tab]")[next]?.focus();
  };
  return (
    <div className="tabs">
      <div role="tablist" aria-label={label} onKeyDown={press}>
        {tabs.map(({ name, note }, i) => (
          <button
            key={name}
            type="button"
            role="tab"
            id={`${id}-${i}`}
            aria-selected={i === chosen}
            aria-controls={`${id}-panel`}
            tabIndex={i === chosen ? 0 : -1}
            onClick={() => setChosen(i)}
          >
            {name}
            {note && <small>{note}</small>}
          </button>
        ))}
      </div>
      {/* A panel that only holds text can be scrolled by the keyboard when it can be focused. */}
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: see above */}
      <div className="tab-panel" role="tabpanel" id={`${id}-panel`} aria-labelledby={`${id}-${chosen}`} tabIndex={0}>
        {tabs[chosen]!.content}
      </div>
      {tabs[chosen]!.below}
    </div>
  );
}
