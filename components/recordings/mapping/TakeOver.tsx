import { useState } from 'react';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { Notice } from '@/components/ui/Notice';
import { formatDay } from '@/components/ui/format-day';
import { useMapTemplates } from '@/hooks/map-templates';
import { useRecordingsOfVehicle } from '@/hooks/recordings';
import type { ChannelMap, FilePreview, Recording } from '@/shared/contracts/recordings';
import { fits, fittingParts, misfits, misfitWords } from './map-fit';
import type { TakeMap } from './PreviewFindings';

export interface TakeOverProps {
  recording: Pick<Recording, 'id' | 'vehicleId' | 'vehicleName'>;
  previews: readonly FilePreview[];
  onTake: TakeMap;
}

interface Source {
  value: string;
  label: string;
  /** In a sentence. */
  words: string;
  map: ChannelMap;
}

/** Mappings of the vehicle to take over: its templates, and what earlier recordings were decoded by. Nothing where there are none. */
export function TakeOver({ recording, previews, onTake }: TakeOverProps) {
  const vehicleId = recording.vehicleId ?? '';
  const templates = (useMapTemplates(vehicleId).data ?? []).map(templateSource);
  const earlier = (useRecordingsOfVehicle(vehicleId).data ?? [])
    .filter(({ id }) => id !== recording.id)
    .flatMap(recordingSource);
  const others = earlier.filter(({ map }) => fits(map, previews));
  const left = earlier.length - others.length;
  const [failed, setFailed] = useState<Source | null>(null);
  const sources = [...templates, ...others];
  if (sources.length === 0) return null;
  const take = (value: string) => {
    const source = sources.find((one) => one.value === value);
    if (!source) return;
    const parts = fittingParts(source.map, previews);
    setFailed(fits(source.map, previews) ? null : source);
    if (Object.keys(parts).length > 0) onTake(parts, source.words);
  };
  return (
    <Card>
      <Choice
        label={`Use a template or an earlier mapping of ${recording.vehicleName ?? 'the vehicle'}`}
        placeholder="Choose a mapping"
        options={sources}
        value=""
        onChange={take}
        hint={left > 0 ? leftOut(left) : undefined}
      />
      {failed ? <Misfits source={failed} previews={previews} /> : null}
    </Card>
  );
}

const leftOut = (count: number) =>
  count === 1
    ? 'One earlier recording has other columns and is left out.'
    : `${count} earlier recordings have other columns and are left out.`;

function Misfits({ source, previews }: { source: Source; previews: readonly FilePreview[] }) {
  const nothing = Object.keys(fittingParts(source.map, previews)).length === 0;
  const title = `${source.words} ${nothing ? 'does not fit' : 'fits in part'}`;
  const why = misfits(source.map, previews).map(misfitWords).join('; ');
  return (
    <Notice tone="ochre" urgent title={title}>
      {`${why.charAt(0).toUpperCase()}${why.slice(1)}. ${
        nothing ? 'Nothing was changed.' : 'What fits was put into the form; say the rest below.'
      }`}
    </Notice>
  );
}

const templateSource = ({
  id,
  name,
  channelMap,
}: {
  id: string;
  name: string;
  channelMap: ChannelMap;
}): Source => ({
  value: id,
  label: `Template: ${name}`,
  words: `The template “${name}”`,
  map: channelMap,
});

const recordingSource = ({ id, name, createdAt, channelMap }: Recording): Source[] =>
  channelMap
    ? [
        {
          value: id,
          label: `Recording: ${name}, ${formatDay(createdAt)}`,
          words: `The mapping of “${name}”`,
          map: channelMap,
        },
      ]
    : [];
