import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { AlignedNumber } from '@/components/ui/AlignedNumber';
import { Figures } from '@/components/ui/Figures';
import { Text, type Tone } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
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

/** Parameters that are not the same in all entries. */
export function ParameterTable({ rows, ...table }: TableProps & { rows: readonly ParameterRow[] }) {
  return (
    <Table
      {...table}
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
            <AlignedNumber key={i} value={cell} />
          ),
        ),
      }))}
    />
  );
}

function FigureView({ cell }: { cell: FigureCell }) {
  return (
    <View>
      <AlignedNumber value={cell.value} digits={cell.digits} tone={TONES[cell.verdict]} />
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

const TONES: Record<Verdict, Tone> = { good: 'pine', attention: 'ochre', bad: 'vermilion', plain: 'ink' };

interface Row {
  key: string;
  label: string;
  unit: string;
  cells: ReactNode[];
}

/** One column an entry; where it is narrow the row's name stands above its cells. */
function Table({ label, names, rows }: TableProps & { rows: readonly Row[] }) {
  const { wide } = useBreakpoint();
  const { palette } = useTheme();
  return (
    <View role="table" aria-label={label}>
      <View role="row" style={[styles.row, { borderBottomColor: palette.ink }]}>
        <View role="columnheader" style={wide ? styles.label : styles.hidden} aria-label="Figure">
          {wide ? (
            <Text variant="small" strong tone="soft">
              Figure
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
          style={[styles.row, wide ? null : styles.folded, { borderBottomColor: palette.rule }]}
        >
          <View role="rowheader" style={wide ? styles.label : styles.line}>
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
});
