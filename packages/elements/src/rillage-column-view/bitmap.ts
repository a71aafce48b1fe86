import { classLimits, rampPosition } from '../shared/age-ramp.js';
import type { PaintName, Paints } from '../shared/paints.js';
import { knownDepth, timeOf, type Frame } from './geometry.js';
import type { SectionData, SectionDataColumn } from './section-type.js';

/** What a band's colour stands for: its age, or a tracer between two concentrations as a tint of ink. */
export type Tint = { of: 'age' } | { of: 'tracer'; name: string; low: number; high: number };

/**
 * Draws the bands and the hatched ground, once for a section, a size and a set of colours.
 * @param plain  no colours at all, as forced colours ask for
 * @returns false where there is no canvas to draw on
 */
export function drawBands(
  canvas: HTMLCanvasElement,
  section: SectionData,
  frame: Frame,
  paints: Paints,
  tint: Tint,
  plain: boolean,
): boolean {
  const ratio = Math.min(3, Math.max(1, devicePixelRatio || 1));
  canvas.width = Math.round(frame.width * ratio);
  canvas.height = Math.round(frame.height * ratio);
  const context = canvas.getContext('2d');
  const width = Math.round((frame.right - frame.left) * ratio);
  const height = Math.round((frame.bottom - frame.top) * ratio);
  const bands = context && picture(width, height);
  const ground = context && picture(width, height);
  if (!bands || !ground) return false;
  const colours = plain ? null : palette(paints, tint);
  const pixels = bands.createImageData(width, height);
  const mask = ground.createImageData(width, height);
  fillPixels(section, frame, { width, height, bands: words(pixels), mask: words(mask) }, tint, colours);
  bands.putImageData(pixels, 0, 0);
  ground.putImageData(mask, 0, 0);
  ground.globalCompositeOperation = 'source-in';
  hatch(ground, width, height, ratio, paints.ink);
  const [x, y] = [Math.round(frame.left * ratio), Math.round(frame.top * ratio)];
  context.drawImage(ground.canvas, x, y);
  context.drawImage(bands.canvas, x, y);
  return true;
}

/** CSS colours a layer can have, for the cut: the same as its band. */
export function layerColour(colours: Uint32Array, tint: Tint, column: SectionDataColumn, row: number): string {
  const word = colours[indexOf(tint, column, row)]!;
  return `rgb(${word & 255} ${(word >> 8) & 255} ${(word >> 16) & 255})`;
}

/** The tints from young to old (or low to high), opaque, as little-endian pixels; null without a canvas to read colours with. */
export function palette(paints: Paints, tint: Tint): Uint32Array {
  const names: PaintName[] = tint.of === 'age' ? ['age-1', 'age-2', 'age-3', 'age-4', 'age-5', 'age-6'] : ['paper', 'ink'];
  const stops = names.map((name) => channels(paints[name]));
  return Uint32Array.from({ length: tints }, (_, index) => {
    const share = index / (tints - 1);
    // Neither bare paper nor full ink, so that outline and hatch stay apart from the tint.
    const along = tint.of === 'age' ? share * (stops.length - 1) : 0.06 + 0.74 * share;
    const lower = Math.min(stops.length - 2, Math.floor(along));
    const mix = stops[lower]!.map((from, channel) => Math.round(from + (along - lower) * (stops[lower + 1]![channel]! - from)));
    return (255 << 24) | (mix[2]! << 16) | (mix[1]! << 8) | mix[0]!;
  });
}

const tints = 512;

function indexOf(tint: Tint, column: SectionDataColumn, row: number): number {
  const along =
    tint.of === 'age'
      ? rampPosition((column.youngest[row]! + column.oldest[row]!) / 2) / classLimits.length
      : (column.concentration[tint.name]![row]! - tint.low) / (tint.high - tint.low || 1);
  return Math.round(Math.max(0, Math.min(1, along)) * (tints - 1));
}

interface Target {
  width: number;
  height: number;
  bands: Uint32Array;
  mask: Uint32Array;
}

function fillPixels(section: SectionData, frame: Frame, target: Target, tint: Tint, colours: Uint32Array | null): void {
  const { width, height, bands, mask } = target;
  const { columns, storageInformed } = section;
  const scale = height / frame.depthShown;
  const fade = 0.3 * height;
  let index = 0;
  for (let x = 0; x < width; x++) {
    const time = frame.from + ((x + 0.5) / width) * (frame.to - frame.from);
    while (index < columns.length - 1 && timeOf(section, columns[index]!) < time) index++;
    const column = columns[index]!;
    let y = 0;
    for (let row = 0; row < column.bottom.length; row++) {
      const end = Math.min(height, Math.round(column.bottom[row]! * scale));
      if (end <= y || !colours) continue;
      const colour = colours[indexOf(tint, column, row)]!;
      for (; y < end; y++) bands[y * width + x] = colour;
    }
    y = Math.min(height, Math.round(knownDepth(column) * scale));
    const floor = storageInformed ? Math.min(height, Math.round(column.storage * scale)) : height;
    for (let at = y; at < floor; at++) {
      const alpha = storageInformed ? 255 : Math.round(255 * Math.max(0, 1 - (at - y) / fade));
      mask[at * width + x] = alpha << 24;
    }
  }
}

function hatch(context: CanvasRenderingContext2D, width: number, height: number, ratio: number, ink: string): void {
  context.strokeStyle = ink;
  context.globalAlpha = 0.55;
  context.lineWidth = 0.8 * ratio;
  context.beginPath();
  for (let sum = 0; sum <= width + height; sum += 6 * ratio) {
    context.moveTo(sum, 0);
    context.lineTo(sum - height, height);
  }
  context.stroke();
}

function picture(width: number, height: number): CanvasRenderingContext2D | null {
  const canvas = document.createElement('canvas');
  Object.assign(canvas, { width, height });
  return canvas.getContext('2d');
}

const words = (image: ImageData): Uint32Array => new Uint32Array(image.data.buffer);

/** Red, green and blue of any colour the browser knows, by painting it. */
function channels(colour: string): [number, number, number] {
  const plain = /^rgba?\((\d+), (\d+), (\d+)/.exec(colour);
  if (plain) return [Number(plain[1]), Number(plain[2]), Number(plain[3])];
  const context = picture(1, 1);
  if (!context) return [128, 128, 128];
  context.fillStyle = colour;
  context.fillRect(0, 0, 1, 1);
  const [red, green, blue] = context.getImageData(0, 0, 1, 1).data;
  return [red!, green!, blue!];
}
