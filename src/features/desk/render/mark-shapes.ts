import { LABEL_HEIGHT_PX, labelWidthPx } from './label-layout.ts';
import { COLOURS } from './line-look.ts';
import type { MarkShape, SceneMark } from './scene.ts';

type Painter = (context: CanvasRenderingContext2D, mark: SceneMark) => void;

const FONT = '"Public Sans", "Liberation Sans", Arial, sans-serif';
/** Labels farther from their line's end than this are tied to it by a thin line. */
const TIED_FROM_PX = 20;

/** Text with a halo, so that it can be read over the scan. */
function haloText(
  context: CanvasRenderingContext2D,
  text: string,
  x: number,
  y: number,
  colour: string,
): void {
  context.lineJoin = 'round';
  context.strokeStyle = COLOURS.film;
  context.lineWidth = 3;
  context.strokeText(text, x, y);
  context.fillStyle = colour;
  context.fillText(text, x, y);
}

function circle(context: CanvasRenderingContext2D, radius: number, x = 0, y = 0): void {
  context.beginPath();
  context.arc(x, y, radius, 0, 2 * Math.PI);
}

function plus(context: CanvasRenderingContext2D, arm: number): void {
  context.beginPath();
  context.moveTo(-arm, 0);
  context.lineTo(arm, 0);
  context.moveTo(0, -arm);
  context.lineTo(0, arm);
}

/** Strokes what is in the path twice: as a halo and in the mark's colour. */
function haloStroke(context: CanvasRenderingContext2D, mark: SceneMark, widthPx: number): void {
  context.strokeStyle = COLOURS.film;
  context.lineWidth = widthPx + 2.4;
  context.stroke();
  context.strokeStyle = mark.colour;
  context.lineWidth = widthPx;
  context.stroke();
}

const knownPoint: Painter = (context, mark) => {
  plus(context, 9);
  haloStroke(context, mark, mark.strong ? 2.2 : 1.6);
  circle(context, 5);
  haloStroke(context, mark, mark.strong ? 2.2 : 1.4);
  context.font = `600 12px ${FONT}`;
  haloText(context, mark.text, mark.offsetPx[0], mark.offsetPx[1], mark.colour);
};

const readingPoint: Painter = (context, mark) => {
  if (mark.strong) {
    circle(context, 10);
    haloStroke(context, mark, 1.4);
  }
  circle(context, 6);
  context.fillStyle = COLOURS.film;
  context.fill();
  context.lineWidth = 2.4;
  context.strokeStyle = mark.colour;
  context.stroke();
  circle(context, 1.6);
  context.fillStyle = mark.colour;
  context.fill();
  context.font = `700 13px ${FONT}`;
  haloText(context, mark.text, mark.offsetPx[0], mark.offsetPx[1], mark.colour);
};

const label: Painter = (context, mark) => {
  const [dx, dy] = mark.offsetPx;
  const width = labelWidthPx(mark.text);
  if (Math.hypot(dx, dy) > TIED_FROM_PX) {
    context.beginPath();
    context.moveTo(0, 0);
    context.lineTo(dx, dy);
    // Without a halo, which would wipe out a label drawn before that it crosses.
    context.lineWidth = 0.8;
    context.stroke();
  }
  context.fillStyle = COLOURS.film;
  context.lineWidth = mark.strong ? 2 : 1;
  context.fillRect(dx - width / 2, dy - LABEL_HEIGHT_PX / 2, width, LABEL_HEIGHT_PX);
  context.strokeRect(dx - width / 2, dy - LABEL_HEIGHT_PX / 2, width, LABEL_HEIGHT_PX);
  context.font = `600 11.5px ${FONT}`;
  context.fillStyle = mark.colour;
  context.fillText(mark.text, dx, dy + 0.5);
};

const balloon: Painter = (context, mark) => {
  const [dx, dy] = mark.offsetPx;
  context.beginPath();
  context.moveTo(0, 0);
  context.lineTo(dx, dy);
  haloStroke(context, mark, 1);
  circle(context, 10, dx, dy);
  context.fillStyle = COLOURS.film;
  context.fill();
  context.lineWidth = mark.strong ? 2.6 : 1.4;
  context.strokeStyle = mark.colour;
  context.stroke();
  context.font = `700 12px ${FONT}`;
  context.fillStyle = mark.colour;
  context.fillText(mark.text, dx, dy + 0.5);
};

const handle: Painter = (context) => {
  context.fillRect(-3.5, -3.5, 7, 7);
  context.lineWidth = 1.6;
  context.strokeRect(-3.5, -3.5, 7, 7);
};

const chosenHandle: Painter = (context, mark) => {
  context.fillStyle = mark.colour;
  context.fillRect(-4.5, -4.5, 9, 9);
  context.strokeStyle = COLOURS.film;
  context.lineWidth = 1;
  context.strokeRect(-5, -5, 10, 10);
};

const snapEnd: Painter = (context, mark) => {
  context.beginPath();
  context.rect(-7, -7, 14, 14);
  haloStroke(context, mark, 1.6);
};

const snapLine: Painter = (context, mark) => {
  context.beginPath();
  context.moveTo(0, -8);
  context.lineTo(8, 0);
  context.lineTo(0, 8);
  context.lineTo(-8, 0);
  context.closePath();
  haloStroke(context, mark, 1.6);
};

const snapVertex: Painter = (context, mark) => {
  circle(context, 7);
  haloStroke(context, mark, 1.6);
};

const snapCrossing: Painter = (context, mark) => {
  context.beginPath();
  context.moveTo(-7, -7);
  context.lineTo(7, 7);
  context.moveTo(-7, 7);
  context.lineTo(7, -7);
  haloStroke(context, mark, 1.6);
};

/** The draughtsman's sign for a right angle. */
const snapRightAngle: Painter = (context, mark) => {
  context.beginPath();
  context.moveTo(-8, -8);
  context.lineTo(-8, 8);
  context.lineTo(8, 8);
  context.moveTo(-8, 1);
  context.lineTo(-1, 1);
  context.lineTo(-1, 8);
  haloStroke(context, mark, 1.6);
};

/** A level stroke with hatching below, as ground is drawn. */
const snapBoundary: Painter = (context, mark) => {
  context.beginPath();
  context.moveTo(-9, 0);
  context.lineTo(9, 0);
  for (const x of [-4, 2, 8]) {
    context.moveTo(x, 0);
    context.lineTo(x - 5, 7);
  }
  haloStroke(context, mark, 1.5);
};

/** Three strokes in a row: a line drawn on beyond its end. */
const snapExtension: Painter = (context, mark) => {
  context.beginPath();
  for (const x of [-9, -2, 5]) {
    context.moveTo(x, 0);
    context.lineTo(x + 4, 0);
  }
  context.moveTo(0, -5);
  context.lineTo(0, 5);
  haloStroke(context, mark, 1.5);
};

const cross: Painter = (context, mark) => {
  plus(context, 8);
  haloStroke(context, mark, 1.4);
};

const doubt: Painter = (context, mark) => {
  circle(context, 8);
  haloStroke(context, mark, 1.5);
  context.font = `700 11px ${FONT}`;
  haloText(context, '?', 0, -14, mark.colour);
};

export const MARK_PAINTERS: Record<MarkShape, Painter> = {
  knownPoint,
  readingPoint,
  label,
  callout: label,
  balloon,
  handle,
  chosenHandle,
  snapEnd,
  snapLine,
  snapVertex,
  snapCrossing,
  snapRightAngle,
  snapBoundary,
  snapExtension,
  cross,
  doubt,
};
