import { type Axis, frame } from "./axis.js";
import type { DrawnCrosscheck } from "./drawn-crosscheck.js";
import type { Box } from "./figure.js";
import type { LegendEntry } from "./legend.js";
import { logProbabilityAxis } from "./probability-axis.js";
import { element, straight } from "./svg.js";
import { type Label, MIDDLE, plain, symbol, textAt } from "./text.js";
import { ENERGY_LINE, HIDDEN_FILL, INK, PROFILE_LINE, RESONANCE_LINE, THIN, TICK_TEXT } from "./theme.js";

/** One difference between two methods, and the bound that it has to stay below. */
export interface DifferenceMark {
  readonly pair: Pair;
  readonly difference: number;
  readonly bound: number;
}

/** One quantity, compared between one to three pairs of methods. */
export interface ComparedRow {
  readonly label: Label;
  readonly marks: readonly DifferenceMark[];
}

type Pair = "steppers" | "crank-nicolson" | "split-operator";

const PAIRS: Readonly<Record<Pair, { readonly colour: string; readonly words: string }>> = {
  steppers: { colour: RESONANCE_LINE, words: "both steppers" },
  "crank-nicolson": { colour: PROFILE_LINE, words: "crank-nicolson and witness" },
  "split-operator": { colour: ENERGY_LINE, words: "split-operator and witness" },
};

/** Differences and bounds at or below this are shown at this: no method means digits there. */
const LEAST = 1e-17;
/** Width of labels of decades, so that they keep apart, in ems of the axis that is made for heights. */
const LABEL_STRETCH = 2;

/** The comparisons of probabilities and states, by quantity. */
export function comparedRows({ steppers, witness, matched, checks }: DrawnCrosscheck): ComparedRow[] {
  const values = (what: "transmission" | "reflection"): DifferenceMark[] => {
    const named = steppers.map((each) => ({ name: each.stepper as Pair, ...each[what] }));
    const against = named.map(({ name, value, error }) =>
      mark(name, value - witness[what].value, error + witness[what].error),
    );
    const [a, b] = named;
    return b ? [mark("steppers", a.value - b.value, a.error + b.error), ...against] : against;
  };
  const overTime = checks
    .filter(({ name }) => name === "transmission over time")
    .map(({ value, limit }) => mark("steppers", value, limit));
  const states = matched.states.map(({ between: [a, b], distance, limit }) =>
    mark(b === witness.name ? (a as Pair) : "steppers", distance, limit),
  );
  return [
    { label: [symbol("T")], marks: values("transmission") },
    { label: [symbol("R")], marks: values("reflection") },
    { label: [symbol("T"), { text: "(" }, symbol("t"), { text: ")" }], marks: overTime },
    { label: plain("final state"), marks: states },
  ].filter(({ marks }) => marks.length > 0);
}

const mark = (pair: Pair, difference: number, bound: number): DifferenceMark => ({
  pair,
  difference: Math.max(LEAST, Math.abs(difference)),
  bound: Math.max(LEAST, bound),
});

/** A logarithmic axis over all differences and bounds. */
export function differenceAxis(rows: readonly ComparedRow[], width: number, em: number): Axis {
  const all = rows.flatMap(({ marks }) => marks.flatMap(({ difference, bound }) => [difference, bound]));
  const axis = logProbabilityAxis(Math.min(...all) / 2, Math.max(...all), width, LABEL_STRETCH * em);
  return { ...axis, label: plain("difference, and the bound that it has to stay below") };
}

/** Draws the rows: a dot at each difference, joined to the upright stroke of its bound. */
export function differencePanel(box: Box, rows: readonly ComparedRow[], axis: Axis, em: number): string {
  const count = rows.reduce((sum, { marks }) => sum + marks.length, 0);
  const unit = box.height / (count + GROUP_GAP * rows.length);
  const place = (value: number) => box.x + (axis.position?.(value) ?? 0) * box.width;
  const size = TICK_TEXT * em;
  let top = box.y;
  const parts = rows.map(({ label, marks }, n) => {
    const height = unit * (marks.length + GROUP_GAP);
    const shade =
      n % 2 === 1
        ? element("rect", {
            x: box.x,
            y: top,
            width: box.width,
            height,
            fill: HIDDEN_FILL,
            "fill-opacity": 0.45,
          })
        : "";
    const drawn = marks.map((each, i) => markAt(each, place, top + unit * (i + 0.5 + GROUP_GAP / 2), em));
    const text = textAt(label, {
      x: box.x - 0.6 * em,
      y: top + height / 2 + MIDDLE * size,
      size,
      anchor: "end",
      fill: INK,
    });
    top += height;
    return shade + drawn.join("") + text;
  });
  const guides = axis.ticks.map(({ value }) =>
    straight(place(value), box.y, place(value), box.y + box.height, {
      stroke: INK,
      "stroke-opacity": 0.12,
      "stroke-width": THIN * em,
    }),
  );
  return [...guides, ...parts, frame(box, em)].join("");
}

/** Space above and below the marks of one quantity, in rows. */
const GROUP_GAP = 0.7;

function markAt(
  { pair, difference, bound }: DifferenceMark,
  place: (value: number) => number,
  y: number,
  em: number,
): string {
  const { colour } = PAIRS[pair];
  const [dot, limit] = [place(difference), place(bound)];
  const stroke = { stroke: colour, "stroke-width": 0.09 * em };
  const beyond = difference > bound;
  return [
    straight(dot, y, limit, y, {
      ...stroke,
      "stroke-dasharray": beyond ? `${0.2 * em} ${0.2 * em}` : undefined,
    }),
    straight(limit, y - 0.34 * em, limit, y + 0.34 * em, { ...stroke, "stroke-width": 0.15 * em }),
    element("circle", { cx: dot, cy: y, r: 0.22 * em, fill: beyond ? "#ffffff" : colour, ...stroke }),
  ].join("");
}

/** One entry for each pair that is shown, and what a hollow dot means where there is one. */
export function differenceLegend(rows: readonly ComparedRow[], em: number): LegendEntry[] {
  const marks = rows.flatMap((row) => row.marks);
  const entries = (Object.keys(PAIRS) as Pair[])
    .filter((pair) => marks.some((each) => each.pair === pair))
    .map((pair) => entryOf(pair, false, PAIRS[pair].words, em));
  if (marks.some(({ difference, bound }) => difference > bound))
    entries.push(entryOf("steppers", true, "hollow: beyond its bound", em, INK));
  return entries;
}

function entryOf(pair: Pair, hollow: boolean, words: string, em: number, ink?: string): LegendEntry {
  const colour = ink ?? PAIRS[pair].colour;
  const stroke = { stroke: colour, "stroke-width": 0.09 * em };
  return {
    sample: (x, width, middle) =>
      hollow
        ? element("circle", { cx: x + width / 2, cy: middle, r: 0.22 * em, fill: "#ffffff", ...stroke })
        : straight(x + 0.3 * em, middle, x + width - 0.2 * em, middle, stroke) +
          straight(x + width - 0.2 * em, middle - 0.34 * em, x + width - 0.2 * em, middle + 0.34 * em, {
            ...stroke,
            "stroke-width": 0.15 * em,
          }) +
          element("circle", { cx: x + 0.3 * em, cy: middle, r: 0.22 * em, fill: colour, ...stroke }),
    label: plain(words),
  };
}
