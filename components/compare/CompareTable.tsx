import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Figures } from '@/components/ui/Figures';
import { Text, type Tone } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, space } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import type { Verdict } from '@/components/bench/headline';
import type { CompareRow, FigureCell, ParameterRow } from './compare-rows';
import { EntryMark } from './EntryMark';

interface TableProps {
  /** Of the table, for the screen reader. */
  label: string;
  names: readonly string[];
}

/** The figures of each entry beside those of the first, and the change against it. */
export function FigureTable({ rows, ...table }: TableProps & { rows: readonly CompareRow[] }) {
  return (
    <Table
      {...table}
      rows={rows.map(({ key, label, unit, cells }) => ({
        key,
        label,
        unit,
        cells: cells.map((cell, i) => <FigureView key={i} cell={cell} />),
      }))}
    />
  );
}

/** Parameters that are not the same in all entries; names above the cells, for it stands in a narrow column. */
export function ParameterTable({ rows, ...table }: TableProps & { rows: readonly ParameterRow[] }) {
  return (
    <Table
      {...table}
      folded
      rows={rows.map(({ path, label, unit, cells }) => ({
        key: path,
        label,
        unit,
        cells: cells.map((cell, i) =>
          typeof cell === 'string' ? (
            <Text key={i} variant="label">
              {cell}
            </Text>
          ) : (
            <Number key={i} value={cell} digits={3} tone="ink" />
          ),
        ),
      }))}
    />
  );
}

function FigureView({ cell }: { cell: FigureCell }) {
  return (
    <View>
      <Number value={cell.value} digits={cell.digits} tone={TONES[cell.verdict]} />
      {cell.change ? (
        <Figures variant="small" tone="soft">
          {cell.change}
        </Figures>
      ) : null}
      {cell.remark ? (
        <Figures variant="small" tone={cell.verdict === 'bad' ? 'vermilion' : 'soft'}>
          {cell.remark}
        </Figures>
      ) : null}
    </View>
  );
}

function Number({ value, digits, tone }: { value: number | null; digits: number; tone: Tone }) {
  return (
    <Text variant="body" tone={tone} style={styles.number}>
      {value === null ? '–' : formatNumber(value, digits)}
    </Text>
  );
}

const TONES: Record<Verdict, Tone> = { good: 'pine', attention: 'ochre', bad: 'vermilion', plain: 'ink' };

interface Row {
  key: string;
  label: string;
  unit: string;
  cells: ReactNode[];
}

/** One column an entry; where it is narrow the row's name stands above its cells. */
function Table({ label, names, rows, folded }: TableProps & { rows: readonly Row[]; folded?: boolean }) {
  const roomy = useBreakpoint().wide && !folded;
  const { palette } = useTheme();
  return (
    <View role="table" aria-label={label}>
      <View role="row" style={[styles.row, { borderBottomColor: palette.ink }]}>
        <View role="columnheader" style={roomy ? styles.label : styles.hidden} aria-label="Name">
          {roomy ? (
            <Text variant="small" strong tone="soft">
              Name
            </Text>
          ) : null}
        </View>
        {names.map((name, i) => (
          <View key={i} role="columnheader" style={styles.cell}>
            <EntryMark index={i} />
            <Text variant="small" strong numberOfLines={2}>
              {name}
            </Text>
          </View>
        ))}
      </View>
      {rows.map((row) => (
        <View
          key={row.key}
          role="row"
          style={[styles.row, roomy ? null : styles.folded, { borderBottomColor: palette.rule }]}
        >
          <View role="rowheader" style={roomy ? styles.label : styles.line}>
            <Text variant="label" strong>
              {row.label}
              {row.unit ? <Text variant="small" tone="soft">{`  ${row.unit}`}</Text> : null}
            </Text>
          </View>
          {row.cells.map((cell, i) => (
            <View key={i} role="cell" style={styles.cell}>
              {cell}
            </View>
          ))}
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', gap: space.s, paddingVertical: space.s, borderBottomWidth: hairline },
  folded: { flexWrap: 'wrap' },
  label: { flexGrow: 0, flexShrink: 0, width: 210 },
  line: { width: '100%' },
  hidden: { width: 0 },
  cell: { flex: 1, minWidth: 0 },
  number: { fontFamily: fonts.number },
});
