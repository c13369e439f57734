import { type Control, useWatch } from 'react-hook-form';
import { z } from 'zod';
import { AreaField, FieldGroup, FieldRow, Form, TextField, useZodForm } from '../../components/form';
import { showToast } from '../../components/toast';
import { type ProposalTexts, useSaveTexts, type Words } from './api';
import { Paragraphs } from './paragraphs';
import styles from './proposal.module.css';
import { reminderDaysTyped, typedDays } from './reminder-days';
import { mostLetters, wordsHint, wordsKeys, wordsLabel } from './words';

const text = (most: number) => z.string().trim().max(most);
const schema = z.object({
  company: z.object({
    email: z.union([z.literal(''), z.email({ error: 'Please enter an e-mail address.' }).max(254)]),
    phone: text(40),
    address: text(300),
    licence: text(80),
  }),
  reminderDays: reminderDaysTyped,
  words: z.object({
    scope: text(mostLetters.scope),
    exclusions: text(mostLetters.exclusions),
    timeline: text(mostLetters.timeline),
    locate: text(mostLetters.locate),
    warranty: text(mostLetters.warranty),
    terms: text(mostLetters.terms),
    cancellation: text(mostLetters.cancellation),
  }),
});
type Typed = z.input<typeof schema>;
type Meant = z.output<typeof schema>;

/** Pointers of the server name the texts within the edit. */
const fieldOf = (name: string): string =>
  name.replace(/^texts\./, '').replace(/^reminderDays\..*/, 'reminderDays');

/** What every proposal of the company says beside plan and price. */
export function TextsForm({ answer: { version, texts } }: { readonly answer: ProposalTexts }) {
  const save = useSaveTexts();
  const form = useZodForm<Typed, Meant>(schema, {
    defaultValues: { ...texts, reminderDays: typedDays(texts.reminderDays) },
  });
  const { control } = form;
  return (
    <Form
      form={form}
      label="Texts of proposals"
      submitLabel="Save the texts"
      serverName={fieldOf}
      onSubmit={async (values) => {
        await save.mutateAsync({ baseVersion: version, texts: values });
        showToast({ message: 'The texts are saved. The next revision of each proposal has them.' });
      }}
    >
      <FieldGroup legend="How clients reach you">
        <FieldRow>
          <TextField
            control={control}
            name="company.phone"
            label="Phone"
            type="tel"
            maxLength={40}
            optional
          />
          <TextField
            control={control}
            name="company.email"
            label="E-mail"
            type="email"
            maxLength={254}
            optional
          />
        </FieldRow>
        <AreaField control={control} name="company.address" label="Address" rows={2} optional />
        <TextField
          control={control}
          name="company.licence"
          label="Licence number"
          hint="As the law of your region wants it on a contract."
          maxLength={80}
          optional
        />
      </FieldGroup>
      <FieldGroup legend="Reminders">
        <TextField
          control={control}
          name="reminderDays"
          label="Days after sending"
          hint="Up to five, such as 3, 7, 14. Whoever has answered is not reminded. Empty: nobody is."
          autoComplete="off"
        />
      </FieldGroup>
      <FieldGroup legend="Words">
        {wordsKeys.map((key) => (
          <div key={key} className={styles.textForm}>
            <AreaField
              control={control}
              name={`words.${key}`}
              label={wordsLabel(key)}
              hint={`${wordsHint(key)} An empty line begins a paragraph.`}
              rows={key === 'terms' ? 10 : 5}
            />
            <TextPreview control={control} textKey={key} />
          </div>
        ))}
      </FieldGroup>
    </Form>
  );
}

interface TextPreviewProps {
  readonly control: Control<Typed, unknown, Meant>;
  readonly textKey: keyof Words;
}

/** The paragraphs as the client reads them. */
function TextPreview({ control, textKey }: TextPreviewProps) {
  const value = useWatch({ control, name: `words.${textKey}` });
  return (
    <details>
      <summary>How it reads</summary>
      <div>
        <Paragraphs text={value} />
      </div>
    </details>
  );
}
