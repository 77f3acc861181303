import { versionPath } from '@/components/layout/paths';
import { ExportCard } from '@/components/review/ExportCard';
import { Card } from '@/components/ui/Card';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { fonts } from '@/constants/theme';
import { useParameterSets } from '@/hooks/parameter-sets';
import { itemsOf } from '@/hooks/recordings';
import { releasedSetUrl } from '@/hooks/versions';
import type { Vehicle } from '@/shared/contracts/vehicles';

/** What is released for the vehicle just now, for those who build it in: by hand, and by an address that stays. */
export function ReleasedSetCard({ vehicle }: { vehicle: Vehicle }) {
  const sets = useParameterSets({ vehicleId: vehicle.id, state: 'released' });
  const [set] = itemsOf(sets.data).filter(({ releasedNumber }) => releasedNumber !== null);
  if (sets.isPending || sets.isError) return null;
  if (!set || set.releasedNumber === null)
    return (
      <Card title="Released set">
        <Text variant="label" tone="soft">
          Nothing is released for this vehicle yet.
        </Text>
      </Card>
    );
  const name = `${set.name} v${set.releasedNumber}`;
  return (
    <ExportCard
      title={`Released set: ${name}`}
      name={name}
      urlOf={(format) => releasedSetUrl(vehicle.id, format)}
      unreleased={false}
    >
      <TextLink href={versionPath(set.id, set.releasedNumber)} label="Open the version" />
      <Text variant="small" tone="soft">
        For a build, with an API token that an admin makes; it stays the same from release to release:
      </Text>
      <Text variant="small" style={{ fontFamily: fonts.number }}>
        {`/api/v1/vehicles/${vehicle.id}/released-set?format=c`}
      </Text>
    </ExportCard>
  );
}
