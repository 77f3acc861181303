import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import type { Outage } from '@/shared/contracts/runs';
import { ScheduleSheet, type ScheduleSheetProps } from './ScheduleSheet';

export interface StripButtonsProps extends Pick<ScheduleSheetProps, 'windows' | 'limits' | 'withholdable'> {
  onAdd: () => void;
  onSchedule: (windows: readonly Outage[]) => void;
}

/** Beside the strip: one window, or many by a schedule. */
export function StripButtons({ onAdd, onSchedule, ...schedule }: StripButtonsProps) {
  const [open, setOpen] = useState(false);
  return (
    <View>
      <Button label="Add an outage window" icon="outage" iconOnly kind="plain" onPress={onAdd} />
      <Button
        label="Schedule outage windows"
        icon="schedule"
        iconOnly
        kind="plain"
        onPress={() => setOpen(true)}
      />
      {open ? (
        <ScheduleSheet
          {...schedule}
          onApply={(windows) => {
            onSchedule(windows);
            setOpen(false);
          }}
          onClose={() => setOpen(false)}
        />
      ) : null}
    </View>
  );
}
