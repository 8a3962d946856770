/** Every key of the field's book, by where it works. */
export const KEY_LIST: readonly { place: string; keys: readonly [keys: string, does: string][] }[] = [
  {
    place: "Anywhere on this page",
    keys: [
      ["[ and ]", "pass before, pass after"],
      ["m", "show the unrolled pass, or the brushed stretch, on the map"],
      ["Escape", "let the brushed stretch go"],
      ["?", "this list"],
      ["Tab", "from part to part: reading, map, legend, pass, field, verdict, line-up"],
    ],
  },
  {
    place: "On the unrolled pass",
    keys: [
      ["← and →", "reading by reading; with Shift ten at a time"],
      ["↑ and ↓", "row by row"],
      ["Home and End", "begin and end of the pass"],
      ["Enter", "light the row everywhere; once more lets it go"],
      ["Escape", "let go of reading, stretch and row"],
    ],
  },
  { place: "On the field, as a strip", keys: [["← and →", "pass before, pass after"]] },
  {
    place: "On the time at work",
    keys: [
      ["Space", "play and pause"],
      ["← and →", "10 seconds; with Shift five minutes"],
      ["Home and End", "begin and end of the log"],
    ],
  },
  {
    place: "On the line between two maps",
    keys: [
      ["← and →", "2 %; with Shift 10 %"],
      ["Home and End", "only the one map, only the other"],
    ],
  },
  {
    place: "On the map",
    keys: [
      ["Arrows", "move it"],
      ["+ and −", "nearer, farther"],
    ],
  },
  { place: "On the legend", keys: [["← and →", "move the class edge that has the focus"]] },
];
