import type { Pen } from './pen';

interface PenState {
  fillStyle: Pen['fillStyle'];
  strokeStyle: Pen['strokeStyle'];
  lineWidth: number;
  lineJoin: CanvasLineJoin;
  font: string;
  textAlign: CanvasTextAlign;
  textBaseline: CanvasTextBaseline;
  dash: readonly number[];
  /** Groups opened by clips since the matching save. */
  openGroups: number;
}

const ANCHORS: Partial<Record<CanvasTextAlign, string>> = { center: 'middle', right: 'end', end: 'end' };
/** The middle of a line of text lies so far above its baseline, in ems; SVG viewers differ on dominant-baseline. */
const MIDDLE_EM = 0.345;

function escapeText(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;');
}

function number(value: number): string {
  return String(Math.round(value * 100) / 100);
}

/** A pen that writes SVG: the same drawing code makes the picture on the page and the exported file. */
export class SvgPen implements Pen {
  fillStyle: Pen['fillStyle'] = '#000';
  strokeStyle: Pen['strokeStyle'] = '#000';
  lineWidth = 1;
  lineJoin: CanvasLineJoin = 'miter';
  font = '10px sans-serif';
  textAlign: CanvasTextAlign = 'left';
  textBaseline: CanvasTextBaseline = 'alphabetic';
  #dash: readonly number[] = [];
  #openGroups = 0;
  #path = '';
  #clipCount = 0;
  readonly #stack: PenState[] = [];
  readonly #elements: string[] = [];

  /** The drawing so far, without the svg element around it. */
  toMarkup(): string {
    return this.#elements.join('\n') + '</g>'.repeat(this.#openGroups);
  }

  save(): void {
    const { fillStyle, strokeStyle, lineWidth, lineJoin, font, textAlign, textBaseline } = this;
    const dash = this.#dash;
    const openGroups = this.#openGroups;
    this.#stack.push({
      fillStyle,
      strokeStyle,
      lineWidth,
      lineJoin,
      font,
      textAlign,
      textBaseline,
      dash,
      openGroups,
    });
  }

  restore(): void {
    const state = this.#stack.pop();
    if (!state) return;
    const { dash, openGroups, ...rest } = state;
    Object.assign(this, rest);
    this.#dash = dash;
    this.#elements.push('</g>'.repeat(this.#openGroups - openGroups));
    this.#openGroups = openGroups;
  }

  beginPath(): void {
    this.#path = '';
  }

  moveTo(x: number, y: number): void {
    this.#path += `M${number(x)} ${number(y)}`;
  }

  lineTo(x: number, y: number): void {
    this.#path += `L${number(x)} ${number(y)}`;
  }

  closePath(): void {
    this.#path += 'Z';
  }

  rect(x: number, y: number, width: number, height: number): void {
    this.#path += `M${number(x)} ${number(y)}h${number(width)}v${number(height)}h${number(-width)}Z`;
  }

  /** Whole circles only: the drawing knows no other arcs. */
  arc(x: number, y: number, radius: number): void {
    const r = number(radius);
    const across = number(2 * radius);
    this.#path += `M${number(x - radius)} ${number(y)}a${r} ${r} 0 1 0 ${across} 0a${r} ${r} 0 1 0 -${across} 0Z`;
  }

  clip(): void {
    this.#clipCount += 1;
    const id = `clip-${this.#clipCount}`;
    this.#elements.push(
      `<clipPath id="${id}"><path d="${this.#path}"/></clipPath><g clip-path="url(#${id})">`,
    );
    this.#openGroups += 1;
  }

  fill(): void {
    this.#elements.push(`<path d="${this.#path}" fill="${this.#colour(this.fillStyle)}"/>`);
  }

  stroke(): void {
    this.#elements.push(`<path d="${this.#path}" fill="none"${this.#strokeAttributes()}/>`);
  }

  setLineDash(segments: Iterable<number>): void {
    this.#dash = [...segments];
  }

  fillText(text: string, x: number, y: number): void {
    this.#text(text, x, y, ` fill="${this.#colour(this.fillStyle)}"`);
  }

  strokeText(text: string, x: number, y: number): void {
    this.#text(text, x, y, ` fill="none"${this.#strokeAttributes()}`);
  }

  #strokeAttributes(): string {
    const dash = this.#dash.length > 0 ? ` stroke-dasharray="${this.#dash.map(number).join(' ')}"` : '';
    const width = Math.round(this.lineWidth * 1000) / 1000;
    return ` stroke="${this.#colour(this.strokeStyle)}" stroke-width="${width}" stroke-linejoin="${this.lineJoin}"${dash}`;
  }

  #text(text: string, x: number, y: number, paint: string): void {
    const [, weight = '400', size = '12', family = 'sans-serif'] =
      /^(\d+) ([\d.]+)px (.+)$/.exec(this.font) ?? [];
    const baseline = this.textBaseline === 'middle' ? y + Number(size) * MIDDLE_EM : y;
    const anchor = ANCHORS[this.textAlign];
    this.#elements.push(
      `<text x="${number(x)}" y="${number(baseline)}" font-family="${escapeText(family)}" font-size="${size}" ` +
        `font-weight="${weight}"${anchor ? ` text-anchor="${anchor}"` : ''}${paint}>${escapeText(text)}</text>`,
    );
  }

  #colour(style: Pen['fillStyle']): string {
    return typeof style === 'string' ? escapeText(style) : '#000';
  }
}
