import type { Chart, Mark, Part, Series } from '#libs/present/chart.js';
import { decimateColumns } from '#libs/present/decimate.js';
import { ledHeights } from '#libs/present/led-heights.js';
import { FAINT, INK, PAPER, SOFT, STROKE, WASH } from './ink.js';
import { hatch } from './marks.js';
import type { Paper } from './paper.js';
import { AXIS, type Box, drawAxes, ON_CHART, type PlotFrame, plotFrame } from './plot-frame.js';

/** Columns of ink to the point: finer than any printer shows. */
const COLUMNS_PER_POINT = 2;

const LINES: Record<Part, { width: number; dash: [number, number] | null }> = {
  site: { width: STROKE.heavy, dash: null },
  need: { width: 0.9, dash: [3, 2] },
  after: { width: 0.9, dash: null },
  bank: { width: 2.6, dash: null },
  without: { width: 1, dash: [5, 3] },
  beyond: { width: 0.6, dash: null },
  limit: { width: 0.9, dash: [0.9, 2.2] },
};

/**
 * Draws a chart with lines, fills and marks in a box, as one Figure with its sentence for a reading program.
 * @param box left, top, width, height of the whole [pt]
 */
export function drawChart(paper: Paper, chart: Chart, box: Box): void {
  const hasTicks = chart.marks.some(({ kind }) => kind === 'tick');
  const frame = plotFrame(paper, chart, box, { top: hasTicks ? 24 : 16, right: rightMargin(paper, chart) });
  const bbox: [number, number, number, number] = [box.x, box.y, box.x + box.width, box.y + box.height];
  paper.tagged(
    'Figure',
    () => {
      drawWindows(paper, chart, frame);
      for (const series of chart.series.filter(isFill)) drawFill(paper, series, frame);
      drawAxes(paper, chart, frame);
      for (const series of chart.series.filter((one) => !isFill(one))) drawLine(paper, series, frame);
      for (const mark of chart.marks) drawMark(paper, mark, frame);
      drawTexts(paper, chart.marks, frame);
    },
    { alt: chart.sentence, bbox },
  );
}

function isFill({ shape }: Series): boolean {
  return shape === 'wash' || shape === 'washStair' || shape === 'hatch';
}

function rightMargin(paper: Paper, chart: Chart): number {
  const levels = chart.marks.filter((mark) => mark.kind === 'level');
  const widest = Math.max(0, ...levels.map(({ text }) => paper.type.width([text], AXIS)));
  return levels.length > 0 ? widest + 12 : 8;
}

function drawWindows(paper: Paper, chart: Chart, { plot, atX }: PlotFrame): void {
  for (const mark of chart.marks) {
    if (mark.kind !== 'window') continue;
    const from = Math.max(atX(mark.from), plot.x);
    const to = Math.min(atX(mark.to), plot.x + plot.width);
    if (to > from) paper.doc.rect(from, plot.y, to - from, plot.height).fill(FAINT);
  }
}

/** Points of a series on the page, thinned to the columns of ink; null where the line breaks. */
function points(series: Series, frame: PlotFrame, values: ArrayLike<number>): ([number, number] | null)[] {
  const place = new Float64Array(series.x.length);
  for (let i = 0; i < place.length; i++) place[i] = (frame.atX(series.x[i]!) - frame.plot.x) * COLUMNS_PER_POINT;
  return decimateColumns(place, values).map((i) => {
    const value = values[i]!;
    return Number.isNaN(value) ? null : [frame.atX(series.x[i]!), frame.atY(value)];
  });
}

/** Stretches without gaps. */
function stretches(all: ([number, number] | null)[]): [number, number][][] {
  const out: [number, number][][] = [[]];
  for (const point of all) {
    if (point === null) out.push([]);
    else out.at(-1)!.push(point);
  }
  return out.filter((stretch) => stretch.length > 0);
}

/** Turns points into the corners of a stair that holds each value to the next point. */
function stepped(stretch: [number, number][]): [number, number][] {
  return stretch.flatMap(([x, y], at): [number, number][] => {
    const before = stretch[at - 1];
    return before === undefined
      ? [[x, y]]
      : [
          [x, before[1]],
          [x, y],
        ];
  });
}

function drawLine(paper: Paper, series: Series, frame: PlotFrame): void {
  const { doc } = paper;
  const { width, dash } = LINES[series.part];
  doc.save().lineWidth(width).lineJoin('round');
  if (dash !== null) doc.dash(dash[0], { space: dash[1] });
  for (const stretch of stretches(points(series, frame, series.y))) {
    const path = series.shape === 'stair' ? stepped(stretch) : stretch;
    path.forEach(([x, y], at) => {
      if (at === 0) doc.moveTo(x, y);
      else doc.lineTo(x, y);
    });
  }
  doc.stroke(INK).restore();
}

function drawFill(paper: Paper, series: Series, frame: PlotFrame): void {
  const { doc } = paper;
  const { plot } = frame;
  const upper = stretches(points(series, frame, series.y));
  const lower = series.base === undefined ? null : stretches(points(series, frame, series.base));
  upper.forEach((stretch, at) => {
    const top = series.shape === 'washStair' ? stepped(stretch) : stretch;
    const floor = lower?.[at] ?? [
      [stretch[0]![0], plot.y + plot.height],
      [stretch.at(-1)![0], plot.y + plot.height],
    ];
    const outline = [...top, ...[...floor].reverse()];
    doc.save();
    doc.polygon(...outline);
    if (series.shape !== 'hatch') doc.fill(WASH);
    else {
      doc.clip();
      hatch(doc, plot, 3.2);
    }
    doc.restore();
    if (series.shape === 'washStair') edge(paper, top);
  });
}

/** A thin line along the top of a stair, so that its levels can be told apart. */
function edge(paper: Paper, path: readonly [number, number][]): void {
  const { doc } = paper;
  doc.lineWidth(STROKE.grid);
  for (const [at, [x, y]] of path.entries()) {
    if (at === 0) doc.moveTo(x, y);
    else doc.lineTo(x, y);
  }
  doc.stroke(SOFT);
}

function drawMark(paper: Paper, mark: Mark, frame: PlotFrame): void {
  const { doc } = paper;
  const { plot, atX, atY } = frame;
  switch (mark.kind) {
    case 'ring':
      doc.lineWidth(1.1).circle(atX(mark.x), atY(mark.y), 2.6).fillAndStroke(PAPER, INK);
      return;
    case 'disc':
      doc.circle(atX(mark.x), atY(mark.y), 2.9).fill(INK);
      return;
    case 'join':
      doc.lineWidth(STROKE.tick).moveTo(atX(mark.x), atY(mark.from)).lineTo(atX(mark.x), atY(mark.to)).stroke(INK);
      return;
    case 'tick': {
      const x = atX(mark.x);
      if (x > plot.x + plot.width) return;
      doc.lineWidth(mark.heavy ? 2 : STROKE.tick);
      doc
        .moveTo(x, plot.y - 3)
        .lineTo(x, plot.y - (mark.heavy ? 11 : 8))
        .stroke(INK);
      return;
    }
    case 'level': {
      const y = atY(mark.y);
      doc
        .lineWidth(STROKE.grid)
        .moveTo(plot.x + plot.width, y)
        .lineTo(plot.x + plot.width + 4, y)
        .stroke(SOFT);
      return;
    }
    case 'arrow':
      drawArrow(paper, mark, frame);
      return;
  }
}

function drawArrow(paper: Paper, mark: Extract<Mark, { kind: 'arrow' }>, { atX, atY }: PlotFrame): void {
  const { doc } = paper;
  const { width } = LINES[mark.part];
  const [x0, y0] = [atX(mark.from[0]), atY(mark.from[1])];
  const [x1, y1] = [atX(mark.to[0]), atY(mark.to[1])];
  const length = Math.hypot(x1 - x0, y1 - y0);
  if (length < 0.5) return;
  const [ux, uy] = [(x1 - x0) / length, (y1 - y0) / length];
  const head = Math.min(6 + width, length * 0.8);
  const half = 2 + width * 0.7;
  doc
    .lineWidth(width)
    .moveTo(x0, y0)
    .lineTo(x1 - ux * head * 0.7, y1 - uy * head * 0.7)
    .stroke(INK);
  const [bx, by] = [x1 - ux * head, y1 - uy * head];
  doc.polygon([x1, y1], [bx - uy * half, by + ux * half], [bx + uy * half, by - ux * half]).fill(INK);
}

interface Label {
  text: string;
  x: number;
  y: number;
  style: typeof AXIS;
}

type Placed = Label & { width: number };

/** Texts last, so that no line crosses them; pushed apart where they would touch. */
function drawTexts(paper: Paper, marks: readonly Mark[], frame: PlotFrame): void {
  const { plot, atX, atY } = frame;
  const levels: Label[] = [];
  const labels: Label[] = [];
  for (const mark of marks) {
    if (mark.kind === 'level') {
      levels.push({ text: mark.text, x: plot.x + plot.width + 7, y: atY(mark.y) + 2.8, style: AXIS });
    } else if ((mark.kind === 'ring' || mark.kind === 'label') && mark.text !== undefined && !isLed(mark)) {
      labels.push(
        besidePoint(paper, { text: mark.text, side: mark.side ?? 'right' }, { x: atX(mark.x), y: atY(mark.y) }),
      );
    }
  }
  for (const label of withoutTouching(levels)) paper.type.put([label.text], label.style, label.x, label.y);
  const led = drawLeaders(paper, marks.filter(isLed), frame);
  for (const label of pushedApart(paper, labels, plot, led))
    paper.type.put([label.text], label.style, label.x, label.y);
}

type Led = Extract<Mark, { kind: 'ring' | 'disc' }> & { text: string };

/** A ring whose words stand to the right, where a curve may run: they go up and lead back to it. */
function isLed(mark: Mark): mark is Led {
  return mark.kind === 'ring' && mark.text !== undefined && mark.side === 'right';
}

function drawLeaders(paper: Paper, marks: readonly Led[], { plot, atX, atY }: PlotFrame): Placed[] {
  const room = { line: 10, above: 2.5, top: plot.y + 3 };
  const heights = ledHeights(
    marks.map(({ y }) => atY(y)),
    room,
  );
  return marks.map((mark, k) => {
    const [x, height] = [atX(mark.x), heights[k]!];
    const width = paper.type.width([mark.text], ON_CHART);
    // at the right edge the words stand on the other side
    const side = x + 15 + width <= plot.x + plot.width ? 1 : -1;
    paper.doc
      .lineWidth(0.5)
      .moveTo(x + 3 * side, atY(mark.y))
      .lineTo(x + 13 * side, height)
      .stroke(SOFT);
    return { text: mark.text, style: ON_CHART, x: side > 0 ? x + 15 : x - 15 - width, y: height + 3, width };
  });
}

function besidePoint(paper: Paper, label: { text: string; side: string }, at: { x: number; y: number }): Label {
  const width = paper.type.width([label.text], ON_CHART);
  const places: Record<string, { x: number; y: number }> = {
    left: { x: at.x - width - 6, y: at.y + 3 },
    right: { x: at.x + 6, y: at.y + 3 },
    above: { x: at.x - width / 2, y: at.y - 6 },
    below: { x: at.x - width / 2, y: at.y + 12 },
  };
  return { text: label.text, style: ON_CHART, ...places[label.side]! };
}

/** Keeps the last label and, going down, each that leaves room to the one before it. */
function withoutTouching(labels: readonly Label[]): Label[] {
  const ordered = [...labels].sort((a, b) => a.y - b.y);
  const kept: Label[] = [];
  for (const label of ordered) if (kept.length === 0 || label.y - kept.at(-1)!.y >= 9.5) kept.push(label);
  return kept;
}

/** Moves labels that overlap downwards, and all of them into the box; those that stand already keep their place. */
function pushedApart(paper: Paper, labels: readonly Label[], box: Box, standing: readonly Placed[]): Label[] {
  const placed = [...standing];
  for (const label of [...labels].sort((a, b) => a.y - b.y)) {
    const width = paper.type.width([label.text], label.style);
    const x = Math.min(Math.max(label.x, box.x + 1), Math.max(box.x + box.width - width + 6, box.x));
    let y = Math.max(label.y, box.y + 6);
    for (const other of placed) {
      const overlaps = x < other.x + other.width + 3 && other.x < x + width + 3 && Math.abs(y - other.y) < 10;
      if (overlaps) y = other.y + 10;
    }
    placed.push({ ...label, x, y, width });
  }
  return placed;
}
