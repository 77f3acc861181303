/** A sheet as an SVG document that stands by itself: no style sheet, no script, fonts by name with others behind them. */
import { pictureFonts, type Palette } from '@/shared/tokens';
import { px } from '../model/hatch';
import type { Shape, TextShape, Tone } from './shapes';
import type { Sheet } from './sheet';

/** The document in the colours of `palette`. */
export function sheetSvg(sheet: Sheet, palette: Palette): string {
  const { width, height, clip } = sheet;
  const ink = (tone: Tone | undefined) => (tone === undefined ? 'none' : palette[tone]);
  return [
    `<svg${attributes({ xmlns: 'http://www.w3.org/2000/svg', width, height, viewBox: `0 0 ${width} ${height}`, role: 'img' })}>`,
    `<title>${escaped(sheet.title)}</title>`,
    `<desc>${escaped(sheet.sentence)}</desc>`,
    `<defs><clipPath id="plot"><rect${attributes({
      x: clip.left,
      y: clip.top,
      width: clip.right - clip.left,
      height: clip.bottom - clip.top,
    })}/></clipPath></defs>`,
    `<rect${attributes({ width, height, fill: palette.sheet })}/>`,
    ...sheet.shapes.filter(seen).map((shape) => element(shape, ink, palette.sheet)),
    '</svg>',
  ].join('\n');
}

const seen = (shape: Shape) => shape.kind !== 'path' || shape.d !== '';

type Inker = (tone: Tone | undefined) => string;

function element(shape: Shape, ink: Inker, ground: string): string {
  if (shape.kind === 'text') return words(shape, ink, ground);
  const look = {
    fill: ink(shape.fill),
    'fill-opacity': shape.fill && shape.fillOpacity,
    stroke: ink(shape.stroke),
    'stroke-width': shape.stroke && (shape.strokeWidth ?? 1),
    'stroke-opacity': shape.stroke && shape.strokeOpacity,
    'stroke-dasharray': shape.dash,
    'stroke-linecap': shape.round ? 'round' : undefined,
    'stroke-linejoin': shape.stroke && 'round',
  };
  if (shape.kind === 'rect') {
    const { x, y, width, height } = shape;
    return `<rect${attributes({ x: px(x), y: px(y), width: px(width), height: px(height), ...look })}/>`;
  }
  const at = shape.at && `translate(${shape.at.join(' ')})`;
  const path = `<path${attributes({ d: shape.d, ...look, transform: at })}/>`;
  // The group is cut, not the path: a path's own shift would move its cut along.
  return shape.clipped ? `<g clip-path="url(#plot)">${path}</g>` : path;
}

function words(shape: TextShape, ink: Inker, ground: string): string {
  const [x, y] = [px(shape.x), px(shape.y)];
  const look = {
    x,
    y,
    'text-anchor': shape.anchor,
    'font-family': pictureFonts[shape.face === 'number' ? 'number' : 'label'],
    'font-size': shape.size,
    'font-weight': shape.face === 'strong' ? 600 : undefined,
    fill: ink(shape.tone),
    transform: shape.upright ? `rotate(-90 ${x} ${y})` : undefined,
    ...(shape.halo ? { stroke: ground, 'stroke-width': 3, 'paint-order': 'stroke' } : null),
  };
  return `<text${attributes(look)}>${escaped(shape.text)}</text>`;
}

const attributes = (given: Record<string, string | number | undefined>): string =>
  Object.entries(given)
    .filter(([, value]) => value !== undefined && value !== '')
    .map(([name, value]) => ` ${name}="${escaped(String(value))}"`)
    .join('');

/** XML knows no control characters but these three; they cannot be escaped either. */
const escaped = (text: string): string =>
  Array.from(text)
    .filter((character) => character >= ' ' || '\t\n\r'.includes(character))
    .map((character) => ENTITIES[character] ?? character)
    .join('');

const ENTITIES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' };
