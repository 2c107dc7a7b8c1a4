import { say } from '#libs/present/language.js';
import type { Feeder, SingleLine } from '#libs/present/single-line.js';
import { INK, STROKE } from './ink.js';
import { leading, type Paper } from './paper.js';
import { AXIS, type Box, ON_CHART } from './plot-frame.js';
import {
  drawBreaker,
  drawConductor,
  drawConverter,
  drawCurrentTransformer,
  drawGrid,
  drawLoad,
  drawMeter,
  drawMotor,
  drawStage,
  drawTransformer,
} from './symbols.js';
import type { Style } from './typesetter.js';

/** Share of the width the loads take; the bank stands to the right of them. */
const LOADS_SHARE = 0.54;
const MOST_TRANSFORMERS = 3;
const ABOVE_BUS = 116;
/** A name that takes more lines goes by its number in the list of loads. */
const MOST_NAME_LINES = 3;
const FEEDER_DROP = 20;
const STAGE_DROP = 12;

/** The diagram ready to be drawn, with the height it takes. */
export interface SetDiagram {
  height: number;
  draw(x: number, y: number): void;
}

/**
 * Lays the single-line diagram out for a width: the height follows from the names that have to wrap.
 * @param width what it may take [pt]
 * @returns height and a function that draws it at a place
 */
export function setSingleLine(paper: Paper, diagram: SingleLine, width: number): SetDiagram {
  const primary = diagram.meteredAt === 'primary' ? 11 : 0;
  const above = (diagram.transformers.length === 0 ? ABOVE_BUS - 36 : ABOVE_BUS) + primary;
  const feeders = diagram.feeders.map((feeder) =>
    setFeeder(paper, feeder, (LOADS_SHARE * width) / diagram.feeders.length),
  );
  const bank = diagram.bank.flatMap((line) => paper.type.wrap([line], ON_CHART, (1 - LOADS_SHARE) * width - 6));
  const below = Math.max(
    ...feeders.map(({ height }) => height),
    diagram.stages.length > 0 ? bankTextDrop(diagram) + bank.length * leading(ON_CHART) : 0,
  );
  const height = above + below + leading(AXIS) + 4;
  return {
    height,
    draw(x, y) {
      const box = { x, y, width, height };
      paper.tagged(
        'Figure',
        () => {
          drawSupply(paper, diagram, { box, busY: y + above });
          drawBus(paper, diagram, { box, busY: y + above });
          feeders.forEach((feeder, at) => {
            const share = (LOADS_SHARE * width) / feeders.length;
            feeder.draw({ x: x + share * (at + 0.5), y: y + above });
          });
          drawBank(paper, diagram, { box, busY: y + above });
          bank.forEach((line, n) => {
            paper.type.draw(line, x + width - line.width, y + above + bankTextDrop(diagram) + n * leading(ON_CHART));
          });
          paper.type.put([diagram.notEntered], AXIS, x, y + height - 3);
        },
        { alt: diagram.sentence, bbox: [x, y, x + width, y + height] },
      );
    },
  };
}

/** From the bus down to the first line under the stages [pt]. */
function bankTextDrop(diagram: SingleLine): number {
  const stageHeight = diagram.stages.some(({ detuned }) => detuned) ? 40 : 30;
  return STAGE_DROP + 8 + stageHeight + 25;
}

interface Place {
  box: Box;
  busY: number;
}

/** Grid, meter, transformers, main breaker and current transformer, down to the bus. */
function drawSupply(paper: Paper, diagram: SingleLine, { box, busY }: Place): void {
  const { doc, type } = paper;
  const x = box.x + 0.36 * box.width;
  const gridEnd = drawGrid(doc, { x, y: box.y });
  type.put([diagram.grid], ON_CHART, x + 13, box.y + 11);
  const shown = diagram.transformers.slice(0, MOST_TRANSFORMERS);
  const tap = gridEnd + (diagram.meteredAt === 'primary' ? 20 : 9);
  drawConductor(doc, { x, y: gridEnd }, { x, y: tap });
  if (diagram.meteredAt === 'primary') meterBeside(paper, { x, y: gridEnd + 9 });
  let y = tap;
  if (shown.length > 0) {
    const pitch = 30;
    const first = x - (pitch * (shown.length - 1)) / 2;
    const last = first + pitch * (shown.length - 1);
    if (shown.length > 1) drawConductor(doc, { x: first, y: tap }, { x: last, y: tap });
    shown.forEach((_, at) => {
      const end = drawTransformer(doc, { x: first + at * pitch, y: tap + (shown.length > 1 ? 4 : 0) });
      if (shown.length > 1) {
        drawConductor(doc, { x: first + at * pitch, y: tap }, { x: first + at * pitch, y: tap + 4 });
        drawConductor(doc, { x: first + at * pitch, y: end }, { x: first + at * pitch, y: end + 4 });
      }
      y = shown.length > 1 ? end + 4 : end;
    });
    if (shown.length > 1) drawConductor(doc, { x: first, y }, { x: last, y });
    labelTransformers(paper, diagram, { x: last + 14, y: tap + 14 });
  }
  drawConductor(doc, { x, y }, { x, y: busY });
  drawBreaker(doc, { x, y: y + 5 });
  drawCurrentTransformer(doc, { x, y: busY - 11 });
  if (diagram.meteredAt === 'bus') meterBeside(paper, { x, y: busY - 22 });
}

function meterBeside(paper: Paper, at: { x: number; y: number }): void {
  const right = drawMeter(paper.doc, at);
  const width = paper.type.width(['kWh'], { ...AXIS, size: 5.6 });
  paper.type.put(['kWh'], { ...AXIS, size: 5.6, ink: INK }, at.x + 19.5 - width / 2, at.y + 2);
  paper.type.put([say`meter`], AXIS, right + 4, at.y + 3);
}

function labelTransformers(paper: Paper, diagram: SingleLine, at: { x: number; y: number }): void {
  const all = diagram.transformers;
  const alike = all.every(({ name, detail }) => name === all[0]!.name && detail === all[0]!.detail);
  if (alike) {
    const times = all.length > 1 ? `${all.length} × ` : '';
    paper.type.put([`${times}${all[0]!.name}`], ON_CHART, at.x, at.y);
    paper.type.put([all[0]!.detail], AXIS, at.x, at.y + 11);
    return;
  }
  all.slice(0, MOST_TRANSFORMERS).forEach(({ name, detail }, n) => {
    paper.type.put([`${name}, ${detail}`], ON_CHART, at.x, at.y - 4 + n * 11);
  });
  if (all.length > MOST_TRANSFORMERS) {
    paper.type.put([say`and ${all.length - MOST_TRANSFORMERS} more`], AXIS, at.x, at.y - 4 + MOST_TRANSFORMERS * 11);
  }
}

function drawBus(paper: Paper, diagram: SingleLine, { box, busY }: Place): void {
  const { doc, type } = paper;
  const right = box.x + box.width;
  doc.lineWidth(STROKE.line).moveTo(box.x, busY).lineTo(right, busY).stroke(INK);
  type.put([diagram.bus], AXIS, box.x, busY - 6);
  const { most, least } = diagram.faultLevel;
  type.put([most], ON_CHART, right - type.width([most], ON_CHART), busY - 17);
  type.put([least], AXIS, right - type.width([least], AXIS), busY - 6);
}

interface SetFeeder {
  height: number;
  draw(at: { x: number; y: number }): void;
}

function setFeeder(paper: Paper, feeder: Feeder, width: number): SetFeeder {
  const { doc, type } = paper;
  const wrapped = type.wrap([feeder.name], ON_CHART, width - 8);
  const names = wrapped.length <= MOST_NAME_LINES ? wrapped : type.wrap([feeder.short], ON_CHART, width - 8);
  const details = type.wrap([feeder.detail], AXIS, width - 8);
  const symbolEnd = FEEDER_DROP + 18;
  return {
    height: symbolEnd + 4 + (names.length + details.length) * leading(ON_CHART),
    draw({ x, y }) {
      drawConductor(doc, { x, y }, { x, y: y + FEEDER_DROP });
      const at = { x, y: y + FEEDER_DROP };
      if (feeder.symbol === 'motor') {
        drawMotor(doc, at);
        const letter: Style = { ...ON_CHART, size: 9 };
        type.put(['M'], letter, x - type.width(['M'], letter) / 2, at.y + 12.2);
      } else if (feeder.symbol === 'converter') drawConverter(doc, at);
      else drawLoad(doc, at);
      let baseline = y + symbolEnd + 12;
      for (const line of names) {
        type.draw(line, x - line.width / 2, baseline);
        baseline += leading(ON_CHART);
      }
      for (const line of details) {
        type.draw(line, x - line.width / 2, baseline);
        baseline += leading(AXIS);
      }
    },
  };
}

/** The bank's own bar with its stages, fed through a device and a cable that were not entered. */
function drawBank(paper: Paper, diagram: SingleLine, { box, busY }: Place): void {
  const { doc, type } = paper;
  const { stages } = diagram;
  if (stages.length === 0) return;
  const area = { x: box.x + LOADS_SHARE * box.width + 8, width: (1 - LOADS_SHARE) * box.width - 8 };
  const widest = stages.some(({ times }) => times > 1) ? 52 : 24;
  const pitch = Math.min(widest, area.width / stages.length);
  const first = area.x + area.width - pitch * stages.length + pitch / 2;
  const last = first + pitch * (stages.length - 1);
  const middle = (first + last) / 2;
  const barY = busY + STAGE_DROP + 8;
  drawConductor(doc, { x: middle, y: busY }, { x: middle, y: barY }, true);
  drawBreaker(doc, { x: middle, y: busY + 5 });
  doc
    .lineWidth(2.2)
    .moveTo(first - 7, barY)
    .lineTo(last + 7, barY)
    .stroke(INK);
  let end = barY;
  const size = Math.min(8.6, pitch / 2.2);
  for (const [n, stage] of stages.entries()) {
    const x = first + n * pitch;
    end = Math.max(end, drawStage(doc, { x, y: barY }, stage));
  }
  for (const [n, stage] of stages.entries()) {
    const text = stage.times > 1 ? `${stage.times} × ${stage.text}` : stage.text;
    const style: Style = { ...ON_CHART, size, tabular: false };
    type.put([text], style, first + n * pitch - type.width([text], style) / 2, end + 9);
  }
}
