import { transformerCautions } from '@lampwright/geometry/cautions';
import { useEffect, useRef, useState } from 'react';
import { Button } from '../../components/button';
import {
  AreaField,
  ChoiceField,
  FieldGroup,
  FieldRow,
  Form,
  NumberField,
  TextField,
  useZodForm,
} from '../../components/form';
import { Note, Problem } from '../../components/states';
import { formatMoment } from '../../lib/format';
import type { Job } from '../../lib/jobs';
import { useMe } from '../../lib/me';
import { siteWalkSchema } from '../../lib/site-walk';
import { useSaveSiteWalk } from './api';
import { dropDraft, emptySiteWalk, keepDraft, readDraft, type StoredDraft } from './draft';

const answers = [
  { value: 'yes', label: 'Yes' },
  { value: 'no', label: 'No' },
  { value: 'unknown', label: 'Not known' },
] as const;

const buried = [
  { name: 'irrigation', label: 'Irrigation lines', note: 'Where they run, who can mark them' },
  { name: 'gas', label: 'Private gas line', note: 'To a grill, a heater, a fire pit' },
  { name: 'petFence', label: 'Pet fence', note: 'Where the wire runs' },
] as const;

interface SiteWalkFormProps {
  readonly job: Job;
  readonly onSaved: () => void;
}

export function SiteWalkForm({ job, onSaved }: SiteWalkFormProps) {
  const me = useMe();
  const save = useSaveSiteWalk(job.id);
  const sent = job.siteWalk ?? emptySiteWalk;
  const [restored, setRestored] = useState<StoredDraft | null>(() =>
    readDraft(localStorage, me.user.id, job.id),
  );
  const [kept, setKept] = useState(true);
  const form = useZodForm(siteWalkSchema, { defaultValues: restored?.draft ?? sent });
  const { control } = form;
  const done = useRef(false);

  // Every keystroke is kept before anything is sent; writing is quick enough not to wait for a pause.
  useEffect(() => {
    const subscription = form.watch(() => {
      if (!done.current) setKept(keepDraft(localStorage, me.user.id, job.id, form.getValues(), new Date()));
    });
    return () => subscription.unsubscribe();
  }, [form, me.user.id, job.id]);

  const device = me.company?.words.protectiveDevice ?? 'GFCI';
  const lineVolts = me.company?.region === 'us' ? '120' : '230';

  return (
    <div style={{ display: 'grid', gap: 24 }}>
      {restored && (
        <Note>
          <p>What you typed on {formatMoment(restored.at)} and did not save yet is back.</p>
          <p style={{ marginBlockStart: 8 }}>
            <Button
              onClick={() => {
                form.reset(sent);
                dropDraft(localStorage, me.user.id, job.id);
                setRestored(null);
              }}
            >
              Leave it, show what is saved
            </Button>
          </p>
        </Note>
      )}
      {!kept && (
        <Problem error="This browser keeps nothing: what you type is lost if the page is closed before it is saved." />
      )}
      <Form
        form={form}
        label="Site walk"
        submitLabel="Save the site walk"
        onSubmit={async (values) => {
          await save.mutateAsync(values);
          done.current = true;
          dropDraft(localStorage, me.user.id, job.id);
          onSaved();
        }}
      >
        <FieldGroup legend="Power">
          {transformerCautions(device).map((caution) => (
            <p key={caution} className="quiet">
              {caution}
            </p>
          ))}
          <FieldRow>
            <NumberField
              control={control}
              name="lineVoltsUnderLoad"
              label="Line volts under load"
              hint="At the outlet, with something drawing on it."
              unit="V"
              placeholder={lineVolts}
            />
            <NumberField
              control={control}
              name="circuitRatingAmps"
              label="Rating of its circuit"
              hint="As the breaker says."
              unit="A"
            />
          </FieldRow>
          <TextField
            control={control}
            name="outletLocation"
            label="Outlet"
            hint="Where it is, and whether it has an in-use cover."
            maxLength={400}
          />
          <TextField
            control={control}
            name="otherLoadsOnCircuit"
            label="What else is on the circuit"
            maxLength={400}
          />
          <ChoiceField
            control={control}
            name="protected"
            label={`Protected by ${device === 'RCD' ? 'an RCD' : `a ${device}`}?`}
            options={answers}
          />
        </FieldGroup>

        <FieldGroup legend="What is there already">
          <TextField
            control={control}
            name="existingTransformer"
            label="Transformer"
            hint="Rating, taps, state."
            maxLength={400}
          />
          <TextField
            control={control}
            name="existingCable"
            label="Cable"
            hint="Gauge as printed, state of the splices."
            maxLength={400}
          />
        </FieldGroup>

        <FieldGroup legend="In the ground">
          <p className="quiet">
            Utility locate services mark no private lines. Ask, mark, and hand-dig near marks.
          </p>
          {buried.map(({ name, label, note }) => (
            <div key={name} style={{ display: 'grid', gap: 10 }}>
              <ChoiceField control={control} name={`${name}.present`} label={`${label}?`} options={answers} />
              {form.watch(`${name}.present`) === 'yes' && (
                <TextField control={control} name={`${name}.note`} label={note} maxLength={400} />
              )}
            </div>
          ))}
        </FieldGroup>

        <FieldGroup legend="Rules">
          <AreaField
            control={control}
            name="associationRules"
            label="Association rules"
            hint="Hours, brightness, what may be seen from the street."
            rows={2}
          />
          <AreaField control={control} name="permits" label="Permits" rows={2} />
        </FieldGroup>
        <AreaField
          control={control}
          name="notes"
          label="Anything else"
          hint="What the client wants lit; trees, steps, slopes."
        />
      </Form>
    </div>
  );
}
