import { router } from 'expo-router';
import { useState } from 'react';
import { Screen } from '@/components/layout/Screen';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ConfirmDialog } from '@/components/ui/Dialog';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { Facts } from '@/components/ui/Facts';
import { NoPermission } from '@/components/ui/NoPermission';
import { Notice } from '@/components/ui/Notice';
import { SkeletonList } from '@/components/ui/Skeleton';
import { useToast } from '@/components/ui/ToastProvider';
import { useDeleteRequirement, useRequirement, useSaveRequirement } from '@/hooks/requirements';
import { useCan } from '@/hooks/session';
import type { Requirement } from '@/shared/contracts/requirements';
import { scheduleWords } from '@/shared/requirements/metric-words';
import { fromRequirement, NEW_REQUIREMENT } from './requirement-form';
import { RequirementForm } from './RequirementForm';

const BACK = '/requirements';

/** A requirement of one's own. */
export function NewRequirementScreen() {
  const save = useSaveRequirement(null);
  const mayWrite = useCan('requirement:write');
  const toast = useToast();
  return (
    <Screen title="Add a requirement" back={BACK} width="page">
      {mayWrite ? (
        <RequirementForm
          initial={NEW_REQUIREMENT}
          saveLabel="Add the requirement"
          onSave={async (input) => {
            await save.mutateAsync(input);
            router.replace(BACK);
            toast({ message: `“${input.name}” is required from now on.` });
          }}
        />
      ) : (
        <NoPermission message="Viewers read; an engineer, approver or admin states requirements." />
      )}
    </Screen>
  );
}

/** One that there is. Changing it makes what was judged by it out of date. */
export function EditRequirementScreen({ id }: { id: string }) {
  const requirement = useRequirement(id);
  return (
    <Screen
      title={requirement.data?.name ?? 'Requirement'}
      back={BACK}
      width="page"
      actions={requirement.data ? <Delete requirement={requirement.data} /> : undefined}
    >
      {requirement.isPending ? <SkeletonList label="the requirement" rows={2} /> : null}
      {requirement.isError ? (
        <ErrorState
          title="This requirement cannot be shown"
          error={requirement.error}
          onRetry={() => void requirement.refetch()}
        />
      ) : null}
      {requirement.data ? <Loaded key={requirement.data.changedAt} requirement={requirement.data} /> : null}
    </Screen>
  );
}

function Loaded({ requirement }: { requirement: Requirement }) {
  const save = useSaveRequirement(requirement.id);
  const mayWrite = useCan('requirement:write');
  const toast = useToast();
  if (!mayWrite)
    return (
      <Card>
        <Facts
          facts={[
            { label: 'Required', value: requirement.sentence },
            { label: 'Vehicle', value: requirement.vehicleName ?? 'every vehicle' },
            { label: 'Recordings', value: requirement.recordings.map(({ name }) => name).join(', ') },
            { label: 'Outages', value: scheduleWords(requirement.schedule) },
          ]}
        />
      </Card>
    );
  return (
    <>
      <Notice tone="ochre">
        What was judged by it is out of date once it is changed, until it is verified again.
      </Notice>
      <RequirementForm
        initial={fromRequirement(requirement)}
        saveLabel="Save"
        onSave={async (input) => {
          await save.mutateAsync(input);
          toast({ message: 'Saved.' });
        }}
      />
    </>
  );
}

function Delete({ requirement }: { requirement: Requirement }) {
  const [open, setOpen] = useState(false);
  const remove = useDeleteRequirement();
  const mayWrite = useCan('requirement:write');
  const toast = useToast();
  if (!mayWrite) return null;
  const confirm = async () => {
    try {
      await remove.mutateAsync(requirement.id);
      router.replace(BACK);
      toast({ message: `“${requirement.name}” is required no more.` });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <>
      <Button label="Delete" icon="delete" iconOnly kind="danger" onPress={() => setOpen(true)} />
      <ConfirmDialog
        open={open}
        danger
        title={`Delete “${requirement.name}”?`}
        message="It is judged no more, and its column of verdicts goes from every draft and review. What was released keeps its evidence."
        confirmLabel="Delete the requirement"
        busy={remove.isPending}
        onConfirm={() => void confirm()}
        onClose={() => setOpen(false)}
      >
        {remove.isError ? (
          <Notice tone="vermilion" urgent title="Not deleted">
            {messageOf(remove.error)}
          </Notice>
        ) : null}
      </ConfirmDialog>
    </>
  );
}
