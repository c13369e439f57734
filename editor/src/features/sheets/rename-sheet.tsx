import { z } from 'zod';
import { Dialog } from '../../components/dialog';
import { Form, TextField, useZodForm } from '../../components/form';
import type { Sheet } from '../../lib/sheets';
import { useRenameSheet } from './api';

const schema = z.object({ name: z.string().trim().min(1).max(120) });

interface RenameSheetProps {
  readonly jobId: string;
  readonly sheet: Sheet;
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
}

export function RenameSheet(props: RenameSheetProps) {
  return (
    <Dialog open={props.open} onOpenChange={props.onOpenChange} title="Rename the sheet">
      <RenameForm {...props} />
    </Dialog>
  );
}

function RenameForm({ jobId, sheet, onOpenChange }: RenameSheetProps) {
  const rename = useRenameSheet(jobId, sheet.id);
  const form = useZodForm(schema, { defaultValues: { name: sheet.name } });
  return (
    <Form
      form={form}
      label="Rename the sheet"
      submitLabel="Rename"
      onSubmit={async ({ name }) => {
        await rename.mutateAsync(name);
        onOpenChange(false);
      }}
    >
      <TextField control={form.control} name="name" label="Name" maxLength={120} />
    </Form>
  );
}
