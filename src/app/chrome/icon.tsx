const shapes = {
  plus: "M8 3v10M3 8h10",
  minus: "M3 8h10",
  whole: "M3 6V3h3M10 3h3v3M13 10v3h-3M6 13H3v-3",
  play: "M5 3l8 5-8 5z",
  pause: "M5 3v10M11 3v10",
  back: "M10 3L5 8l5 5",
  forth: "M6 3l5 5-5 5",
  start: "M4 3v10M12 3L7 8l5 5",
  end: "M12 3v10M4 3l5 5-5 5",
  close: "M4 4l8 8M12 4l-8 8",
  again: "M13 8a5 5 0 1 1-1.5-3.6M13 2v3h-3",
  folder: "M2 4h4l2 2h6v7H2z",
  film: "M2 3h12v10H2zM5 3v10M11 3v10",
  save: "M8 2v8M4.5 7L8 10.5 11.5 7M3 13.5h10",
  rising: "M4 10l4-4 4 4",
  falling: "M4 6l4 4 4-4",
} as const;

export type IconName = keyof typeof shapes;

/** A small line drawing beside or in place of words; the words are for the button that carries it. */
export function Icon({ name }: { name: IconName }) {
  return (
    <svg className="icon" viewBox="0 0 16 16" aria-hidden="true">
      <path d={shapes[name]} />
    </svg>
  );
}
