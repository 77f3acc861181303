/** Shapes of a chart into a PDF: the same that the screen draws and that a saved picture holds. */
import type { Shape } from '@/shared/charts/figure/shapes';
import type { Sheet as Picture } from '@/shared/charts/figure/sheet';
import { palettes } from '@/shared/tokens';
import type { Sheet } from './sheet';

/** Draws `picture` over the whole width of the page, in paper inks. */
export function drawPicture(sheet: Sheet, picture: Picture): void {
  const scale = sheet.width / picture.width;
  const top = sheet.space(picture.height * scale);
  const { doc } = sheet;
  const [x, y] = [doc.x, doc.y];
  doc.save();
  doc.translate(sheet.left, top).scale(scale);
  for (const shape of picture.shapes) {
    doc.save();
    draw(sheet, shape, picture);
    doc.restore();
  }
  doc.restore();
  [doc.x, doc.y] = [x, y];
}

function draw(sheet: Sheet, shape: Shape, { clip }: Picture): void {
  const { doc } = sheet;
  if (shape.kind === 'text') return write(sheet, shape);
  if (shape.kind === 'path' && shape.clipped)
    doc.rect(clip.left, clip.top, clip.right - clip.left, clip.bottom - clip.top).clip();
  if (shape.kind === 'path' && shape.at) doc.translate(shape.at[0], shape.at[1]);
  if (shape.kind === 'path') {
    if (shape.d === '') return;
    doc.path(shape.d);
  } else doc.rect(shape.x, shape.y, shape.width, shape.height);
  ink(sheet, shape);
}

function ink({ doc }: Sheet, shape: Exclude<Shape, { kind: 'text' }>): void {
  const { stroke, strokeWidth = 1, strokeOpacity = 1, dash, round, fill, fillOpacity = 1 } = shape;
  doc.lineWidth(strokeWidth).lineJoin('round');
  if (round) doc.lineCap('round');
  if (dash) {
    const [on = 1, off = on] = dash.split(/[ ,]+/).map(Number);
    doc.dash(on, { space: off });
  }
  if (fill) doc.fillColor(palettes.paper[fill], fillOpacity);
  if (stroke) doc.strokeColor(palettes.paper[stroke], strokeOpacity);
  if (fill && stroke) doc.fillAndStroke();
  else if (fill) doc.fill();
  else if (stroke) doc.stroke();
}

function write(
  sheet: Sheet,
  { x, y, text, tone, face, size, anchor = 'start', upright }: Extract<Shape, { kind: 'text' }>,
): void {
  if (upright) sheet.doc.rotate(-90, { origin: [x, y] });
  sheet.line(text, x, y, { face, size, colour: palettes.paper[tone], anchor });
}
