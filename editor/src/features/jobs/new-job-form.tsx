import {
  AreaField,
  CheckField,
  ChoiceField,
  FieldGroup,
  FieldRow,
  Form,
  TextField,
  useZodForm,
} from '../../components/form';
import { useCreateJob } from './api';
import { ClientPicker } from './client-picker';
import {
  emptyNewJob,
  type NewJobForm as NewJobFields,
  newJobFieldOf,
  newJobFormSchema,
  newJobOf,
} from './new-job';
import { PropertyPicker } from './property-picker';

interface NewJobFormProps {
  /** The client whose page led here. */
  readonly clientId: string | null;
  readonly onMade: (jobId: string) => void;
}

export function NewJobForm({ clientId, onMade }: NewJobFormProps) {
  const create = useCreateJob();
  const start: NewJobFields =
    clientId === null ? emptyNewJob : { ...emptyNewJob, clientMode: 'existing', clientId };
  const form = useZodForm(newJobFormSchema, { defaultValues: start });
  const { control } = form;
  const mode = form.watch('clientMode');
  const chosen = form.watch('clientId');
  const known = mode === 'existing' && chosen !== '';
  const ownProperty = known && form.watch('propertyMode') === 'existing';

  return (
    <Form
      form={form}
      label="New job"
      submitLabel="Create the job"
      submitKind="lamp"
      serverName={newJobFieldOf}
      onSubmit={async (values) => {
        // A new client has no property to choose from, whatever was chosen before.
        const sent = known ? values : { ...values, propertyMode: 'new' as const };
        const job = await create.mutateAsync(newJobOf(sent));
        onMade(job.id);
      }}
    >
      <TextField
        control={control}
        name="name"
        label="Job"
        hint="How you speak of it: the house, and the part of it."
        maxLength={120}
      />

      <FieldGroup legend="Client">
        <ChoiceField
          control={control}
          name="clientMode"
          label="Whose garden is it?"
          options={[
            { value: 'new', label: 'New client' },
            { value: 'existing', label: 'Existing client' },
          ]}
        />
        {mode === 'new' ? (
          <>
            <TextField control={control} name="clientName" label="Name" autoComplete="off" maxLength={120} />
            <FieldRow>
              <TextField
                control={control}
                name="clientEmail"
                label="E-mail"
                type="email"
                autoComplete="off"
                optional
              />
              <TextField
                control={control}
                name="clientPhone"
                label="Phone"
                type="tel"
                autoComplete="off"
                optional
              />
            </FieldRow>
          </>
        ) : (
          <ClientPicker control={control} />
        )}
      </FieldGroup>

      <FieldGroup legend="Property">
        {known && (
          <ChoiceField
            control={control}
            name="propertyMode"
            label="Where is it?"
            options={[
              { value: 'existing', label: 'A property we know' },
              { value: 'new', label: 'New property' },
            ]}
          />
        )}
        {ownProperty ? (
          <PropertyPicker control={control} clientId={chosen} />
        ) : (
          <>
            <TextField control={control} name="address" label="Address" autoComplete="off" maxLength={400} />
            <TextField
              control={control}
              name="propertyName"
              label="What you call it"
              hint="Left empty, the first line of the address."
              optional
              maxLength={120}
            />
            <AreaField
              control={control}
              name="accessNotes"
              label="Getting in"
              hint="Gate, dog, where to park."
              optional
              rows={2}
            />
          </>
        )}
      </FieldGroup>

      <FieldGroup legend="The job">
        <CheckField
          control={control}
          name="existingSystem"
          label="There is a system in the ground already"
          hint="The plan then begins with a survey of what is found."
        />
        <AreaField control={control} name="notes" label="Notes" hint="What the client wants lit." optional />
      </FieldGroup>
    </Form>
  );
}
