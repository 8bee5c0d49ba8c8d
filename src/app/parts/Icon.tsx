/** Our own line icons, drawn on a grid of 24. */
const PATHS = {
  film: 'M12 3c4 5 6 8 6 11a6 6 0 0 1-12 0c0-3 2-6 6-11z M9 15a3 3 0 0 0 3 3',
  light: 'M4 16h16 M7 16a5 5 0 0 1 10 0 M12 4v3 M4.5 8.5l2 1.6 M19.5 8.5l-2 1.6 M8 20h8',
  mark: 'M4 8V4h4 M16 4h4v4 M20 16v4h-4 M8 20H4v-4 M12 9v6 M9 12h6',
  map: 'M3 7c3-2 6 2 9 0s6-2 9 0 M3 12c3-2 6 2 9 0s6-2 9 0 M3 17c3-2 6 2 9 0s6-2 9 0',
  view: 'M3 9h18 M12 13v8 M8 21l4-8 4 8 M12 3v2 M5 5l1.5 1.5 M19 5l-1.5 1.5',
  amount: 'M6 3h12v18H6z M6 9h4 M6 13h4 M6 17h4 M18 12c-2-1.5-4 1.5-6 0',
  back: 'M15 5l-7 7 7 7',
  undo: 'M8 6L4 10l4 4 M4 10h10a5 5 0 0 1 0 10h-3',
  redo: 'M16 6l4 4-4 4 M20 10H10a5 5 0 0 0 0 10h3',
  sun: 'M12 8a4 4 0 1 0 0 8 4 4 0 0 0 0-8z M12 2v2 M12 20v2 M2 12h2 M20 12h2',
  photo: 'M4 7h4l2-2h4l2 2h4v12H4z M12 10a3 3 0 1 0 0 6 3 3 0 0 0 0-6z',
  open: 'M3 18V6h6l2 3h10v9z M3 13h18',
  left: 'M19 12H5 M11 6l-6 6 6 6',
  right: 'M5 12h14 M13 6l6 6-6 6',
  up: 'M12 19V5 M6 11l6-6 6 6',
  down: 'M12 5v14 M6 13l6 6 6-6',
  plus: 'M12 5v14 M5 12h14',
  minus: 'M5 12h14',
  remove: 'M6 6l12 12 M18 6L6 18',
  tick: 'M5 13l4 4 10-11',
  wipe: 'M9 7l-5 5 5 5 M15 7l5 5-5 5',
  save: 'M12 4v11 M7 11l5 5 5-5 M5 20h14',
  records: 'M5 3h14v18H5z M9 8h6 M9 12h6 M9 16h3',
  chart: 'M8 3h8v18H8z M8 8h4 M8 13h4 M8 18h4',
  info: 'M12 3a9 9 0 1 0 0 18 9 9 0 0 0 0-18z M12 11v5 M12 8v.01',
} as const;

export type IconName = keyof typeof PATHS;

export function Icon({ name }: { readonly name: IconName }) {
  return (
    <svg class="icon" viewBox="0 0 24 24" aria-hidden="true" focusable="false">
      <path d={PATHS[name]} />
    </svg>
  );
}
