/** A paged document: words, tables and drawings one under the other, in the product's own faces; pages are numbered at the end. */
import PDFDocument from 'pdfkit';
import { palettes } from '@/shared/tokens';

/** A4, points. */
const MARGIN = 56;
const FOOT = 44;
const WIDTH = 595.28 - 2 * MARGIN;
export type InkName = 'ink' | 'inkSoft' | 'rule' | 'petrol' | 'vermilion' | 'pine' | 'ochre';
const INK: Record<InkName, string> = palettes.paper;

const FACES = {
  text: '@expo-google-fonts/barlow/400Regular/Barlow_400Regular.ttf',
  strong: '@expo-google-fonts/barlow/600SemiBold/Barlow_600SemiBold.ttf',
  label: '@expo-google-fonts/barlow-semi-condensed/500Medium/BarlowSemiCondensed_500Medium.ttf',
  number: '@expo-google-fonts/azeret-mono/400Regular/AzeretMono_400Regular.ttf',
  /** Greek letters and signs that the others lack. */
  greek: '@expo-google-fonts/noto-sans-math/400Regular/NotoSansMath_400Regular.ttf',
} as const;
export type Face = keyof typeof FACES;
const GREEK = /([\u0370-\u03ff\u2190-\u25ff]+)/;

export interface Column {
  title: string;
  /** Share of the page's width. */
  share: number;
  align?: 'left' | 'right';
  face?: Face;
}
export interface Cell {
  text: string;
  ink?: InkName;
  face?: Face;
}

interface Style {
  face: Face;
  size: number;
  ink: InkName;
  align?: 'left' | 'right';
}

export class Sheet {
  readonly doc: PDFKit.PDFDocument;
  private readonly done: Promise<Buffer>;

  constructor(
    title: string,
    private readonly foot: string,
  ) {
    this.doc = new PDFDocument({
      size: 'A4',
      margins: { top: MARGIN, left: MARGIN, right: MARGIN, bottom: MARGIN + FOOT },
      bufferPages: true,
      info: { Title: title, Producer: 'Driftwright', Creator: 'Driftwright' },
    });
    for (const [name, file] of Object.entries(FACES)) this.doc.registerFont(name, require.resolve(file));
    const chunks: Buffer[] = [];
    this.done = new Promise((resolve, reject) => {
      this.doc.on('data', (chunk: Buffer) => chunks.push(chunk));
      this.doc.on('end', () => resolve(Buffer.concat(chunks)));
      this.doc.on('error', reject);
    });
  }

  /** Width between the margins, points. */
  get width(): number {
    return WIDTH;
  }
  get left(): number {
    return MARGIN;
  }

  title(text: string): void {
    this.put(text, { face: 'strong', size: 22, ink: 'ink' });
    this.gap(4);
  }

  heading(text: string): void {
    this.room(72);
    this.gap(16);
    this.put(text, { face: 'strong', size: 14, ink: 'ink' });
    this.rule();
    this.gap(6);
  }

  subheading(text: string): void {
    this.room(48);
    this.gap(8);
    this.put(text, { face: 'strong', size: 10.5, ink: 'ink' });
    this.gap(2);
  }

  paragraph(text: string, ink: InkName = 'ink'): void {
    this.put(text, { face: 'text', size: 9.5, ink });
    this.gap(4);
  }

  small(text: string, face: Face = 'label'): void {
    this.put(text, { face, size: 8, ink: 'inkSoft' });
  }

  /** Rows between rules; the head stands again on each page. */
  table(columns: readonly Column[], rows: readonly (readonly Cell[])[]): void {
    const head = columns.map(({ title }) => ({
      text: title,
      ink: 'inkSoft' as const,
      face: 'label' as const,
    }));
    this.room(46);
    this.row(columns, head);
    for (const row of rows) {
      const height = this.heightOf(columns, row);
      if (this.doc.y + height > this.bottom()) {
        this.doc.addPage();
        this.row(columns, head);
      }
      this.row(columns, row);
    }
    this.gap(6);
  }

  /** Leaves so much room for a drawing, on one page; answers its upper edge. */
  space(height: number): number {
    this.room(height);
    const top = this.doc.y;
    this.doc.y = top + height;
    this.doc.x = MARGIN;
    return top;
  }

  gap(height: number): void {
    this.doc.y += height;
  }

  /** Numbers the pages and closes the document. */
  async finish(): Promise<Buffer> {
    const { doc } = this;
    const { start, count } = doc.bufferedPageRange();
    for (let page = start; page < start + count; page += 1) {
      doc.switchToPage(page);
      // Below the margin, where words would otherwise open a new page.
      doc.page.margins.bottom = 0;
      const y = doc.page.height - FOOT;
      doc
        .moveTo(MARGIN, y - 6)
        .lineTo(MARGIN + WIDTH, y - 6)
        .lineWidth(0.5)
        .strokeColor(INK.rule)
        .stroke();
      this.words(this.foot, MARGIN, y, WIDTH - 70, { face: 'label', size: 8, ink: 'inkSoft' });
      const place = `page ${page - start + 1} of ${count}`;
      this.words(place, MARGIN + WIDTH - 70, y, 70, {
        face: 'label',
        size: 8,
        ink: 'inkSoft',
        align: 'right',
      });
    }
    doc.end();
    return this.done;
  }

  private bottom(): number {
    return this.doc.page.height - MARGIN - FOOT;
  }

  private room(height: number): void {
    if (this.doc.y + height > this.bottom()) this.doc.addPage();
  }

  private rule(): void {
    const { doc } = this;
    doc
      .moveTo(MARGIN, doc.y + 2)
      .lineTo(MARGIN + WIDTH, doc.y + 2)
      .lineWidth(0.75)
      .strokeColor(INK.rule)
      .stroke();
  }

  private put(text: string, style: Style): void {
    this.words(text, MARGIN, this.doc.y, WIDTH, style);
  }

  private heightOf(columns: readonly Column[], row: readonly Cell[]): number {
    const heights = row.map(({ text, face }, i) => {
      const column = columns[i]!;
      this.doc.font(face ?? column.face ?? 'label').fontSize(CELL_PT);
      return this.doc.heightOfString(printable(text) || ' ', { width: column.share * WIDTH - GUTTER });
    });
    return Math.max(...heights) + 2 * CELL_GAP;
  }

  private row(columns: readonly Column[], row: readonly Cell[]): void {
    const { doc } = this;
    const [top, height] = [doc.y, this.heightOf(columns, row)];
    let x = MARGIN;
    for (const [i, column] of columns.entries()) {
      const { text, face = column.face ?? 'label', ink = 'ink' } = row[i]!;
      const width = column.share * WIDTH;
      const style: Style = { face, size: CELL_PT, ink, align: column.align };
      this.words(text, x, top + CELL_GAP, width - GUTTER, style);
      x += width;
    }
    const bottom = top + height;
    doc
      .moveTo(MARGIN, bottom)
      .lineTo(MARGIN + WIDTH, bottom)
      .lineWidth(0.5)
      .strokeColor(INK.rule)
      .stroke();
    doc.x = MARGIN;
    doc.y = bottom;
  }

  /** Words whose Greek letters come from another face. */
  private words(text: string, x: number, y: number, width: number, { face, size, ink, align }: Style): void {
    const { doc } = this;
    const parts = partsOf(text, face);
    doc.fillColor(INK[ink]).fontSize(size);
    if (parts.length > 1 && this.widthOf(parts) <= width) {
      // Faces differ in height: on one baseline they stand as one line.
      const [at, anchor] = align === 'right' ? ([x + width, 'end'] as const) : ([x, 'start'] as const);
      this.line(text, at, y + ASCENT * size, { face, size, colour: INK[ink], anchor });
      doc.x = x;
      doc.y = y + LINE_HEIGHT * size;
      return;
    }
    for (const [i, part] of parts.entries()) {
      doc.font(part.face);
      const options = { width, align, continued: i < parts.length - 1 };
      if (i === 0) doc.text(part.text, x, y, options);
      else doc.text(part.text, options);
    }
  }

  /** One line with its baseline at `y`, beginning, centred or ending at `x`. */
  line(
    text: string,
    x: number,
    y: number,
    look: { face: Face; size: number; colour: string; anchor: Anchor },
  ): void {
    const { doc } = this;
    doc.fontSize(look.size).fillColor(look.colour);
    const parts = partsOf(text, look.face);
    const width = this.widthOf(parts);
    let at = x - { start: 0, middle: width / 2, end: width }[look.anchor];
    for (const part of parts) {
      doc.font(part.face).text(part.text, at, y, { lineBreak: false, baseline: 'alphabetic' });
      at += doc.widthOfString(part.text);
    }
  }

  private widthOf(parts: readonly { text: string; face: Face }[]): number {
    return parts.reduce((sum, part) => sum + this.doc.font(part.face).widthOfString(part.text), 0);
  }
}

export type Anchor = 'start' | 'middle' | 'end';

/** Greek letters and arrows in a face that has them, all else in `face`. */
const partsOf = (text: string, face: Face): { text: string; face: Face }[] =>
  printable(text)
    .split(GREEK)
    .filter((part) => part !== '')
    .map((part) => ({ text: part, face: GREEK.test(part) ? 'greek' : face }));

/** Of the faces of words, in their size. */
const ASCENT = 1;
const LINE_HEIGHT = 1.2;
const CELL_PT = 8.5;
const CELL_GAP = 3;
const GUTTER = 8;

/** Narrow spaces that no face has become plain ones that do not break. */
const printable = (text: string) => text.replace(/[\u2009\u202f]/g, '\u00a0');
