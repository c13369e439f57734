import { z } from 'zod';
import { Dialog } from '../../components/dialog';
import { AreaField, CheckField, FieldRow, Form, TextField, useZodForm } from '../../components/form';
import type { Job } from '../../lib/jobs';
import { useEditJob } from './api';

const schema = z.object({
  name: z.string().trim().min(1).max(120),
  siteWalkOn: z.iso.date().nullable(),
  installOn: z.iso.date().nullable(),
  existingSystem: z.boolean(),
  notes: z.string().max(8000),
});

interface EditJobProps {
  readonly job: Job;
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
}

export function EditJob(props: EditJobProps) {
  return (
    <Dialog open={props.open} onOpenChange={props.onOpenChange} title="Job details">
      <EditJobForm {...props} />
    </Dialog>
  );
}

function EditJobForm({ job, onOpenChange }: EditJobProps) {
  const edit = useEditJob(job.id);
  const form = useZodForm(schema, {
    defaultValues: {
      name: job.name,
      siteWalkOn: job.siteWalkOn,
      installOn: job.installOn,
      existingSystem: job.existingSystem,
      notes: job.notes,
    },
  });
  const { control } = form;
  return (
    <Form
      form={form}
      label="Job details"
      submitLabel="Save"
      onSubmit={async (values) => {
        await edit.mutateAsync(values);
        onOpenChange(false);
      }}
    >
      <TextField control={control} name="name" label="Job" maxLength={120} />
      <FieldRow>
        <TextField control={control} name="siteWalkOn" label="Site walk" type="date" emptyAsNull optional />
        <TextField control={control} name="installOn" label="Install" type="date" emptyAsNull optional />
      </FieldRow>
      <CheckField control={control} name="existingSystem" label="There is a system in the ground already" />
      <AreaField control={control} name="notes" label="Notes" optional />
    </Form>
  );
}
