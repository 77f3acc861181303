import { useState } from 'react';
import { View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { Sheet } from '@/components/ui/Sheet';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { palettes } from '@/constants/theme';
import { useChartOrigin } from './chart-origin';
import { csvText, type CsvTable } from '@/shared/charts/figure/csv';
import { download, fileName, pngOf } from './save-files';
import { figureSheet, type ChartFigure, type Origin } from '@/shared/charts/figure/sheet';
import { sheetSvg } from '@/shared/charts/figure/svg';

export interface SaveControlProps {
  /** The chart's title; part of the file's name. */
  name: string;
  /** Made when it is asked for. */
  figure: () => ChartFigure;
  tables: () => CsvTable[];
}

/** A button in a chart's head that saves it: picture as SVG or PNG, figures as CSV. */
export function SaveControl(props: SaveControlProps) {
  const origin = useChartOrigin();
  const [open, setOpen] = useState(false);
  if (!origin) return null;
  return (
    // The target is higher than the head's line and reaches over its neighbours without moving them.
    <View style={{ marginVertical: -OVERLAP_PX }}>
      <Button
        label={`Save ${props.name}`}
        icon="download"
        iconOnly
        kind="plain"
        onPress={() => setOpen(true)}
      />
      {open ? <SaveMenu {...props} origin={origin} onClose={() => setOpen(false)} /> : null}
    </View>
  );
}

function SaveMenu({
  name,
  figure,
  tables,
  origin,
  onClose,
}: SaveControlProps & { origin: Origin; onClose: () => void }) {
  const { wide } = useBreakpoint();
  const toast = useToast();
  const [choices] = useState(tables);
  const save = async (part: string, ending: 'svg' | 'png' | 'csv', make: () => Promise<Blob> | Blob) => {
    const file = fileName(origin, name, part, ending);
    try {
      download(await make(), file);
      toast({ message: `Saved as ${file}` });
    } catch (error) {
      toast({
        message: error instanceof Error ? error.message : 'It could not be saved.',
        tone: 'vermilion',
      });
    }
    onClose();
  };
  // On paper and in reports the charts are light, whatever the screen is.
  const picture = () => {
    const sheet = figureSheet(figure(), origin);
    return { sheet, svg: sheetSvg(sheet, palettes.paper) };
  };
  const png = () => {
    const { sheet, svg } = picture();
    return pngOf(svg, sheet.width, sheet.height);
  };
  const Frame = wide ? Dialog : Sheet;
  return (
    <Frame open title={`Save ${name}`} onClose={onClose}>
      <Button
        wide
        label="Picture, SVG"
        onPress={() => void save('', 'svg', () => new Blob([picture().svg], { type: 'image/svg+xml' }))}
      />
      <Button wide label="Picture, PNG" onPress={() => void save('', 'png', png)} />
      {choices.map(({ part, label, columns }) => (
        <Button
          key={part}
          wide
          label={label}
          onPress={() =>
            void save(part, 'csv', () => new Blob([csvText(columns)], { type: 'text/csv;charset=utf-8' }))
          }
        />
      ))}
      <Text variant="small" tone="soft">
        Pictures show what is in view, in the colours of paper. Curves hold as many points as the screen
        needs, extremes kept; the run’s own files hold every epoch.
      </Text>
    </Frame>
  );
}

const OVERLAP_PX = 10;
