/**
 * A version as a C99 header: one constant a parameter, as exact as the number itself. Numbers are written in the shortest
 * form that reads back to the same double, which a conforming compiler's conversion does (ISO/IEC 9899:1999, 6.4.4.2 and F.5).
 */
import type { ExportDocument, ExportedValue } from '@/shared/contracts/exports';
import { aboutLines } from './about';

const PREFIX = 'nav_';

export function asCHeader(document: ExportDocument): string {
  const guard = `NAV_PARAMETERS_${identifier(document.set.name).toUpperCase()}_V${document.version.number}_H`;
  const head = [
    document.notice,
    '',
    ...aboutLines(document).slice(1).map(([name, value]) => `${name}: ${value}`), // prettier-ignore
    '',
    ...document.cautions,
  ];
  return [
    '/*',
    ...head.map((line) => ` * ${inComment(line)}`.trimEnd()),
    ' */',
    `#ifndef ${guard}`,
    `#define ${guard}`,
    '',
    `#define NAV_PARAMETERS_RELEASED ${document.released ? 1 : 0}`,
    '',
    text('set_name', document.set.name),
    `static const int ${PREFIX}set_version = ${document.version.number};`,
    text('set_state', document.version.state),
    text('set_checksum_sha256', document.checksum.value),
    '',
    ...document.values.flatMap(constant),
    `#endif /* ${guard} */`,
    '',
  ].join('\n');
}

function constant({ path, name, value, unit, shown }: ExportedValue): string[] {
  const id = PREFIX + identifier(path);
  const inUnit = unit === '' || unit === '1' ? '' : `, ${unit}`;
  const asShown = shown.unit && shown.unit !== unit ? ` (${rounded(shown.value)} ${shown.unit})` : '';
  return [`/* ${inComment(name + inUnit + asShown)} */`, declaration(id, path, value), ''];
}

const rounded = (value: number | string) =>
  typeof value === 'number' ? Number(value.toPrecision(6)) : value;

function declaration(id: string, path: string, value: ExportedValue['value']): string {
  if (typeof value === 'number') return `static const double ${id} = ${literal(value)};`;
  if (typeof value === 'boolean') return `static const int ${id} = ${value ? 1 : 0};`;
  if (typeof value === 'string') return text(identifier(path), value);
  return `static const double ${id}[${value.length}] = { ${value.map(literal).join(', ')} };`;
}

const text = (name: string, value: string) => `static const char ${PREFIX}${name}[] = ${quoted(value)};`;

/** The number as a constant of type double. */
export function literal(value: number): string {
  const shortest = Object.is(value, -0) ? '-0' : String(value);
  return /[.e]/.test(shortest) ? shortest : `${shortest}.0`;
}

/** `gyro.whiteNoiseRadPerSqrtS` → `gyro_white_noise_rad_per_sqrt_s`; letters, digits and underscores alone. */
export const identifier = (name: string): string =>
  name
    .normalize('NFKD')
    .replace(/([a-z0-9])([A-Z])/g, '$1_$2')
    .replace(/([A-Z])([A-Z][a-z])/g, '$1_$2')
    .replace(/[^A-Za-z0-9]+/g, '_')
    .replace(/^_+|_+$/g, '')
    .toLowerCase() || 'set';

/** Neither ends the comment, nor begins one within it, nor holds a trigraph. */
const inComment = (line: string) =>
  line.replace(/\s+/g, ' ').replace(/\*\//g, '* /').replace(/\/\*/g, '/ *').replace(/\?(?=\?)/g, '? ').replace(/\\$/, '\\ .'); // prettier-ignore

const quoted = (value: string) =>
  `"${value.replace(/[\\"?]/g, '\\$&').replace(/\p{Cc}/gu, (one) => `\\${one.charCodeAt(0).toString(8).padStart(3, '0')}`)}"`; // prettier-ignore
