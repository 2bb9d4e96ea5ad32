import PDFDocument from 'pdfkit';
import { colours, contentWidth, fonts, page, sizes } from './paper-theme.ts';

export interface Column {
  title: string;
  /** Points; the one column without a width takes what is left. */
  width?: number;
  align?: 'left' | 'right';
}
export type Cell = string | { text: string; strong?: boolean };

// The fonts' own names: under these, and only these, the library finds an opened font again wherever it looks for it.
const REGULAR = 'WorkSans-Regular';
const STRONG = 'WorkSans-SemiBold';
/** A heading stays with the first lines of what follows it. */
const headingRoom = 104;
const cellPadding = { top: 3.5, bottom: 3.5, left: 4, right: 4 };
/** Figures of one width, so that columns of numbers stand straight. Costs time: only where numbers stand in columns. */
const figures = { features: ['tnum' as const] };

/**
 * Writes a tagged PDF from top to bottom: headings, paragraphs, lists, tables whose head is repeated on each page, and
 * figures with a text equivalent. The same calls give the same bytes.
 */
export class PaperWriter {
  readonly doc: PDFKit.PDFDocument;
  private readonly root: PDFKit.PDFStructureElement | null;
  private readonly chunks: Buffer[] = [];

  /** @param about `date` stands in the file as its creation date; `tagged` false makes a page to be appended elsewhere */
  constructor(about: { title: string; date: Date; tagged: boolean }) {
    this.doc = new PDFDocument({
      size: [page.width, page.height],
      margin: page.margin,
      pdfVersion: '1.7',
      lang: 'en-US',
      tagged: about.tagged,
      displayTitle: true,
      bufferPages: true,
      // A standard font would be embedded for nothing; the types know no null.
      font: null as unknown as string,
      info: { Title: about.title, Creator: 'Kerfyard', Producer: 'Kerfyard', CreationDate: about.date },
    });
    this.doc.on('data', (chunk: Buffer) => this.chunks.push(chunk));
    this.doc.font(fonts.regular).font(fonts.strong);
    this.root = about.tagged ? this.doc.struct('Document') : null;
    if (this.root !== null) this.doc.addStructure(this.root);
    this.reset();
  }

  title(text: string, subtitle: string): void {
    this.mark();
    this.tag('H1', () => this.text(text, { size: sizes.title, strong: true }));
    this.tag('P', () => this.text(subtitle, { size: sizes.heading, colour: colours.quiet }));
    this.space(10);
  }

  /** The mark at the head of the first page: a short kerf, two parallel strokes with a gap. */
  private mark(): void {
    const { x, y } = { x: page.width - page.margin - 20, y: page.margin };
    this.doc.markContent('Artifact', { type: 'Layout' });
    this.doc.lineWidth(2.8);
    this.doc
      .moveTo(x, y + 17)
      .lineTo(x + 6.5, y)
      .stroke(colours.ink);
    this.doc
      .moveTo(x + 6.7, y + 17)
      .lineTo(x + 13.2, y)
      .stroke(colours.accent);
    this.doc.endMarkedContent();
    this.reset();
  }

  heading(text: string): void {
    this.keep(headingRoom);
    this.space(12);
    this.tag('H2', () => this.text(text, { size: sizes.heading, strong: true, colour: colours.accent }));
    this.space(4);
  }

  paragraph(text: string, options: { quiet?: boolean; strong?: boolean } = {}): void {
    this.tag('P', () =>
      this.text(text, {
        size: options.quiet === true ? sizes.small : sizes.body,
        strong: options.strong ?? false,
        colour: options.quiet === true ? colours.quiet : colours.ink,
      }),
    );
    this.space(4);
  }

  /** Points of a list, each a paragraph with a hanging dash. */
  list(items: readonly string[]): void {
    const list = this.root === null ? null : this.doc.struct('L');
    if (list !== null) this.root?.add(list);
    for (const item of items) {
      this.keep(sizes.body * 2);
      const write = () => this.listItem(item);
      if (list === null) write();
      else list.add(this.doc.struct('LI', {}, write));
      this.space(2);
    }
    list?.end();
    this.space(3);
  }

  private listItem(item: string): void {
    const { y } = this.doc;
    this.style({});
    this.doc.text('–', page.margin, y, { lineBreak: false });
    this.doc.text(this.printable(item), page.margin + 12, y, { width: contentWidth - 12, lineGap: 1.5 });
    this.doc.x = page.margin;
  }

  /** Names and values in two columns without rules. */
  facts(rows: readonly (readonly [string, string])[]): void {
    this.table([{ title: '', width: 130 }, { title: '' }], rows, { bare: true });
  }

  /** A table; its head is written again where it goes on to the next page. */
  table(
    columns: readonly Column[],
    rows: readonly (readonly Cell[])[],
    options: { bare?: boolean; total?: readonly Cell[] } = {},
  ): void {
    const body = rows.map((row) => row.map((cell) => this.cell(cell)));
    if (options.total !== undefined) {
      body.push(
        options.total.map((cell) => ({ ...this.cell(cell), font: { src: STRONG, size: sizes.body } })),
      );
    }
    const head = options.bare === true ? null : columns.map((column) => this.headCell(column));
    let table: PDFKit.Mixins.PDFTableObject | null = null;
    for (const row of body) {
      const height = this.rowHeight(columns, row);
      if (table === null || this.doc.y + height >= this.doc.page.maxY()) {
        table?.end();
        const needed = height + (head === null ? 0 : this.rowHeight(columns, head));
        if (this.doc.y + needed >= this.doc.page.maxY()) this.doc.addPage();
        this.reset();
        table = this.openTable(columns, options.bare === true);
        if (head !== null) table.row(head);
      }
      table.row(row);
    }
    table?.end();
    this.reset();
    this.space(6);
  }

  /** A drawing with its words: `draw` paints inside the box given to it. */
  figure(
    box: { height: number; alt: string },
    draw: (doc: PDFKit.PDFDocument, at: { x: number; y: number; width: number; height: number }) => void,
  ): void {
    this.keep(box.height + 8);
    const at = { x: page.margin, y: this.doc.y, width: contentWidth, height: box.height };
    this.tag(
      'Figure',
      () => {
        this.doc.save();
        draw(this.doc, at);
        this.doc.restore();
      },
      box.alt,
    );
    this.reset(at.y + box.height + 6);
  }

  /** Start a new page unless this much height is left. */
  keep(height: number): void {
    if (this.doc.y + height > this.doc.page.maxY()) this.doc.addPage();
    this.reset();
  }

  space(points: number): void {
    this.doc.y += points;
  }

  /** Write the foot of every page and close the file; a page to be appended elsewhere has no number of its own. */
  async finish(foot: string, { numbered = true }: { numbered?: boolean } = {}): Promise<Buffer> {
    this.root?.end();
    const { start, count } = this.doc.bufferedPageRange();
    for (let index = start; index < start + count; index += 1) {
      this.doc.switchToPage(index);
      // The foot stands in the margin; with the margin in place the text would start a page of its own.
      this.doc.page.margins.bottom = 0;
      const y = page.height - page.margin + 16;
      this.doc.markContent('Artifact', { type: 'Pagination' });
      this.style({ size: sizes.small, colour: colours.quiet });
      this.doc.text(this.printable(foot), page.margin, y, { lineBreak: false });
      if (numbered) {
        const place = `Page ${index - start + 1} of ${count}`;
        this.doc.text(place, page.width - page.margin - this.doc.widthOfString(place), y, {
          lineBreak: false,
        });
      }
      this.doc.endMarkedContent();
    }
    const ended = new Promise<void>((resolve, reject) => {
      this.doc.once('end', resolve);
      this.doc.once('error', reject);
    });
    this.doc.end();
    await ended;
    return Buffer.concat(this.chunks);
  }

  /** Set font, size and colour for what is drawn by hand. */
  style(options: { size?: number; strong?: boolean; colour?: string }): void {
    this.doc
      .font(options.strong === true ? STRONG : REGULAR)
      .fontSize(options.size ?? sizes.body)
      .fillColor(options.colour ?? colours.ink);
  }

  /**
   * Text in characters the embedded font has: others lose their accent or, without a likeness, become "?". A missing
   * glyph would print as an empty box.
   */
  printable(text: string): string {
    return [...text].map((char) => this.printableChar(char)).join('');
  }

  private printableChar(char: string): string {
    if (char === '\n' || hasGlyph(this.doc, char)) return char;
    const plain = (likenesses[char] ?? char).normalize('NFKD').replace(/\p{M}/gu, '');
    return plain !== '' && [...plain].every((part) => hasGlyph(this.doc, part)) ? plain : '?';
  }

  private text(text: string, options: { size?: number; strong?: boolean; colour?: string }): void {
    this.style(options);
    this.doc.text(this.printable(text), page.margin, this.doc.y, {
      width: contentWidth,
      lineGap: 1.5,
    });
  }

  private tag(type: string, write: () => void, alt?: string): void {
    if (this.root === null) write();
    else this.root.add(this.doc.struct(type, alt === undefined ? {} : { alt }, write));
  }

  private openTable(columns: readonly Column[], bare: boolean): PDFKit.Mixins.PDFTableObject {
    return this.doc.table({
      position: { x: page.margin, y: this.doc.y },
      maxWidth: contentWidth,
      ...(this.root === null ? {} : { structParent: this.root }),
      columnStyles: columns.map((column) => ({
        width: column.width ?? '*',
        align: { x: column.align ?? 'left', y: 'top' as const },
        ...(column.align === 'right' ? { textOptions: figures } : {}),
      })),
      defaultStyle: {
        padding: cellPadding,
        border: bare ? 0 : { top: 0, right: 0, bottom: 0.5, left: 0 },
        borderColor: colours.hairline,
        textColor: colours.ink,
      },
    });
  }

  private cell(cell: Cell): { text: string; font: { src: string; size: number } } {
    const { text, strong = false } = typeof cell === 'string' ? { text: cell } : cell;
    return { text: this.printable(text), font: { src: strong ? STRONG : REGULAR, size: sizes.body } };
  }

  private headCell(column: Column) {
    return {
      text: column.title,
      type: 'TH' as const,
      scope: 'Column',
      backgroundColor: colours.ground,
      textColor: colours.quiet,
      font: { src: STRONG, size: sizes.small },
    };
  }

  private rowHeight(
    columns: readonly Column[],
    row: readonly { text: string; font: { src: string; size: number } }[],
  ): number {
    const fixed = columns.reduce((sum, column) => sum + (column.width ?? 0), 0);
    const heights = row.map((cell, index) => {
      const width = (columns[index]?.width ?? contentWidth - fixed) - cellPadding.left - cellPadding.right;
      this.doc.font(cell.font.src).fontSize(cell.font.size);
      return this.doc.heightOfString(cell.text === '' ? ' ' : cell.text, { width });
    });
    return Math.max(...heights) + cellPadding.top + cellPadding.bottom;
  }

  private reset(y: number = this.doc.y): void {
    this.doc.x = page.margin;
    this.doc.y = y;
    this.style({});
  }
}

/** Letters that do not come apart into a base and an accent. */
const likenesses: Record<string, string> = {
  ł: 'l',
  Ł: 'L',
  đ: 'd',
  Đ: 'D',
  ħ: 'h',
  ŧ: 't',
  '≤': '<=',
  '≥': '>=',
};

function hasGlyph(doc: PDFKit.PDFDocument, char: string): boolean {
  const { font } = (doc as unknown as { _font: { font: { hasGlyphForCodePoint(code: number): boolean } } })
    ._font;
  return font.hasGlyphForCodePoint(char.codePointAt(0) ?? 0);
}
