import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { z } from 'zod';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Dialog } from '@/components/ui/Dialog';
import { Figures } from '@/components/ui/Figures';
import { Sheet } from '@/components/ui/Sheet';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { useDisplayUnits } from '@/hooks/preferences';
import { itemsOf } from '@/hooks/recordings';
import { useCreateParameterSet, useCreateVersion, useParameterSets } from '@/hooks/parameter-sets';
import { useLive } from '@/hooks/use-live-run';
import { nameSchema } from '@/shared/contracts/common';
import { noteSchema, type VersionCreateInput } from '@/shared/contracts/parameter-sets';
import { describeChanges } from './describe-changes';
import { ghostKey } from './ghost-store';
import type { Bench } from './use-bench';

const NEW_SET = 'new';
const formSchema = z.object({ name: z.string(), note: noteSchema });
type Form = z.infer<typeof formSchema>;

/** Saves what is set as a version: of the set it came from, of another one, or of a new one. */
export function SaveDialog({ bench, onClose }: { bench: Bench; onClose: () => void }) {
  const { wide } = useBreakpoint();
  const toast = useToast();
  const router = useRouter();
  const sets = itemsOf(useParameterSets().data);
  const [target, setTarget] = useState(bench.start.set?.id ?? NEW_SET);
  const createSet = useCreateParameterSet();
  const createVersion = useCreateVersion(target);
  const run = useProvingRun(bench);
  const changes = describeChanges(bench.start.from, bench.config.parameters, useDisplayUnits());
  const form = useForm<Form>({ resolver: zodResolver(formSchema), defaultValues: { name: '', note: '' } });
  const problem = form.formState.errors.root?.message;

  const save = form.handleSubmit(async ({ name, note }) => {
    const version: VersionCreateInput = {
      note,
      parameters: bench.config.parameters,
      outages: [...bench.config.outages],
      recordingId: bench.start.recording.id,
      runId: run ?? undefined,
      parentNumber: target === bench.start.set?.id ? bench.start.set.version.number : undefined,
    };
    try {
      const saved = await store(name, version);
      if (!saved) return;
      toast({ message: `Saved as ${saved.words}.` });
      onClose();
      router.push(`/sets/${saved.setId}` as Href);
    } catch (error) {
      showProblem<Form>(error, ['name', 'note'], form.setError);
    }
  });

  async function store(name: string, version: VersionCreateInput) {
    if (target !== NEW_SET) {
      const { number } = await createVersion.mutateAsync(version);
      const setName = sets.find((set) => set.id === target)?.name ?? bench.start.set?.name ?? 'the set';
      return { setId: target, words: `${setName} v${number}` };
    }
    const checked = nameSchema.safeParse(name);
    if (!checked.success) {
      form.setError('name', { message: checked.error.issues[0]?.message });
      return null;
    }
    const { vehicleId } = bench.start.recording;
    const set = await createSet.mutateAsync({
      name: checked.data,
      vehicleId: vehicleId ?? undefined,
      version,
    });
    return { setId: set.id, words: `${set.name} v1` };
  }

  const Frame = wide ? Dialog : Sheet;
  const length = useWatch({ control: form.control, name: 'note' }).length;
  return (
    <Frame
      open
      title="Save as a version"
      onClose={onClose}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            label="Save version"
            kind="primary"
            busy={form.formState.isSubmitting}
            onPress={() => void save()}
          />
        </>
      }
    >
      <FormProblem title="It was not saved" message={problem} />
      <Choice
        label="Into"
        value={target}
        onChange={setTarget}
        options={[
          ...(bench.start.set && !sets.some((set) => set.id === bench.start.set?.id)
            ? [{ value: bench.start.set.id, label: `${bench.start.set.name}, next version` }]
            : []),
          ...sets.map((set) => ({ value: set.id, label: `${set.name}, v${set.versionCount + 1}` })),
          { value: NEW_SET, label: 'a new set' },
        ]}
      />
      {target === NEW_SET ? (
        <FormField
          control={form.control}
          name="name"
          label="Name of the set"
          placeholder="Harbour"
          required
        />
      ) : null}
      <FormField
        control={form.control}
        name="note"
        label="What changed and why"
        multiline
        required
        hint={length > 1800 ? `${2000 - length} characters left` : undefined}
      />
      <Text variant="label" strong>
        {changes.length === 0 ? 'Nothing differs from where it started.' : 'Changed'}
      </Text>
      {changes.map((line) => (
        <Figures key={line} variant="label" tone="soft">
          {line}
        </Figures>
      ))}
      <Text variant="label" tone="soft">
        {run
          ? 'The last run, its curves and figures are kept with the version.'
          : 'No finished run shows these values yet: the version is saved without one.'}
      </Text>
    </Frame>
  );
}

/** The finished run of exactly what is set, if there is one. */
function useProvingRun(bench: Bench): string | null {
  const state = useLive(bench.live, (live) => live);
  const { summaryRequest, summaryRunId } = state;
  const { parameters, outages } = bench.config;
  if (!summaryRequest || state.phase !== 'done') return null;
  const request = summaryRequest as { parameters: typeof parameters; outages: typeof outages };
  return ghostKey(request.parameters, request.outages) === ghostKey(parameters, outages)
    ? summaryRunId
    : null;
}
