/** Every key that does something, as the keyboard map tells it. What a key does is built where it is heard; this only names it. */

export interface KeyLine {
  /** Pressed together ("Ctrl" "Z"), or one after the other ("g" "r") where `then` is set. */
  keys: readonly string[];
  then?: boolean;
  does: string;
}

export interface KeyGroup {
  title: string;
  /** Where they are heard. */
  where: string;
  lines: readonly KeyLine[];
}

export const KEY_MAP: readonly KeyGroup[] = [
  {
    title: 'Everywhere',
    where: 'while no field is being typed in',
    lines: [
      { keys: ['?'], does: 'shows this map' },
      { keys: ['g', 't'], then: true, does: 'goes to Today' },
      { keys: ['g', 'r'], then: true, does: 'goes to Recordings' },
      { keys: ['g', 'b'], then: true, does: 'goes to the bench' },
      { keys: ['g', 's'], then: true, does: 'goes to Sets' },
      { keys: ['Esc'], does: 'closes a sheet or a dialog' },
    ],
  },
  {
    title: 'Bench',
    where: 'while no field is being typed in',
    lines: [
      { keys: ['Ctrl or ⌘', 'Z'], does: 'undoes the last change' },
      { keys: ['Ctrl or ⌘', 'Shift', 'Z'], does: 'redoes it' },
      { keys: ['1 … 9'], does: 'chooses the view: overview, coasting, budget …' },
      { keys: ['a'], does: 'shows all the time' },
      { keys: ['p'], does: 'pins the run as baseline' },
      { keys: ['c'], does: 'compares the run with the baseline' },
      { keys: ['s'], does: 'saves a version' },
    ],
  },
  {
    title: 'Slider',
    where: 'with the slider in focus',
    lines: [
      { keys: ['← →'], does: 'a step down or up' },
      { keys: ['Shift', '← →'], does: 'a fine step' },
      { keys: ['Page Up', 'Page Down'], does: 'a large step' },
      { keys: ['Home', 'End'], does: 'the least or the most' },
    ],
  },
  {
    title: 'Strip and outage windows',
    where: 'with a window or one of its edges in focus',
    lines: [
      { keys: ['← →'], does: 'moves it by a second' },
      { keys: ['Shift', '← →'], does: 'moves it finely' },
      { keys: ['Page Up', 'Page Down'], does: 'moves it by ten seconds' },
      { keys: ['Delete'], does: 'removes the window' },
    ],
  },
  {
    title: 'Chart',
    where: 'with a chart in focus',
    lines: [
      { keys: ['← →'], does: 'moves the cursor' },
      { keys: ['+', '−'], does: 'zooms in and out' },
      { keys: ['Page Up', 'Page Down'], does: 'half a screen back or on' },
      { keys: ['0'], does: 'shows all the time' },
      { keys: ['Esc'], does: 'takes the cursor away' },
    ],
  },
];
