/** Reads a saved picture back as a viewer would. */
import { XMLParser, XMLValidator } from 'fast-xml-parser';
import { palettes } from '@/constants/theme';
import { figureSheet, type ChartFigure, type Origin, type Sheet } from '@/shared/charts/figure/sheet';
import { sheetSvg } from '@/shared/charts/figure/svg';

export interface SvgNode {
  name: string;
  attributes: Record<string, string>;
  text: string;
}

export const ORIGIN: Origin = {
  recording: 'Breakwater <loop> & "return"',
  run: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e01',
  engineVersion: '1.4.0',
};

/** The document of `figure`, its sheet, and all elements in their order; throws where it is no XML. */
export function documentOf(figure: ChartFigure): { svg: string; sheet: Sheet; nodes: SvgNode[] } {
  const sheet = figureSheet(figure, ORIGIN);
  const svg = sheetSvg(sheet, palettes.paper);
  const valid = XMLValidator.validate(svg);
  if (valid !== true) throw new Error(`${valid.err.msg} in line ${valid.err.line}`);
  const parser = new XMLParser({ ignoreAttributes: false, preserveOrder: true, attributeNamePrefix: '' });
  const nodes: SvgNode[] = [];
  walk(parser.parse(svg) as Parsed[], nodes);
  return { svg, sheet, nodes };
}

type Parsed = Record<string, unknown>;

function walk(list: readonly Parsed[], nodes: SvgNode[]): void {
  for (const entry of list) {
    const name = Object.keys(entry).find((key) => key !== ':@');
    if (name === undefined || name === '#text') continue;
    const children = entry[name] as Parsed[];
    const text = children.map((child) => String(child['#text'] ?? '')).join('');
    nodes.push({ name, attributes: (entry[':@'] ?? {}) as Record<string, string>, text });
    walk(children, nodes);
  }
}

/** End points of the absolute pieces of a path. */
export const pathPoints = (d: string): [number, number][] =>
  [...d.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)].map((match) => [Number(match[1]), Number(match[2])]);
