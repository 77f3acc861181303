import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { Progress } from '@/components/ui/Progress';
import { space } from '@/constants/theme';
import type { UploadState } from '@/hooks/use-upload';
import { formatBytes, formatDuration } from '@/shared/format';

export interface UploadProgressProps {
  state: Extract<UploadState, { phase: 'sending' }>;
  onCancel: () => void;
}

/** Bytes done, bytes to go, the time left, and the way out. */
export function UploadProgress({ state, onCancel }: UploadProgressProps) {
  const { sent, total, perSecond } = state;
  const left = perSecond ? (total - sent) / perSecond : null;
  const whole = total > 0 && sent >= total;
  return (
    <Card>
      <Progress
        label={whole ? 'Arrived; the server is checking' : 'Uploading'}
        value={total > 0 ? sent / total : undefined}
        detail={`${formatBytes(sent)} of ${formatBytes(total)}`}
      />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.m }}>
        <Figures tone="soft" style={{ flex: 1 }}>
          {whole || left === null || !perSecond
            ? 'Stay on this page until it has arrived.'
            : `${formatBytes(perSecond)}/s, about ${formatDuration(Math.max(1, Math.round(left)))} left. Stay on this page until it has arrived.`}
        </Figures>
        <Button label="Cancel the upload" onPress={onCancel} />
      </View>
    </Card>
  );
}
