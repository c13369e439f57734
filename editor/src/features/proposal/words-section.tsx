import { useId, useState } from 'react';
import { Button } from '../../components/button';
import { Section } from '../../components/page';
import { Problem } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { type Proposal, useSetWords, type WordsKey } from './api';
import { Paragraphs } from './paragraphs';
import styles from './proposal.module.css';
import { mostLetters, withOwn, wordsHint, wordsKeys, wordsLabel } from './words';

interface WordsProps {
  readonly jobId: string;
  readonly proposal: Proposal;
  readonly editable: boolean;
  /** Where the company's own words are written. */
  readonly companyWords: React.ReactNode;
}

/** What the proposal says beside plan and price: the company's words, or the job's own in their place. */
export function WordsSection({ jobId, proposal, editable, companyWords }: WordsProps) {
  const [editing, setEditing] = useState<WordsKey | null>(null);
  const set = useSetWords(jobId);
  const { words, own } = proposal;

  const giveBack = (key: WordsKey) => {
    const before = withOwn(words, own, key, words[key]);
    set.mutate(withOwn(words, own, key, null), {
      onSuccess: () =>
        showToast({
          message: `${wordsLabel(key)}: the company’s words again.`,
          undo: () => set.mutateAsync(before),
        }),
      onError: (error) => void showProblem(sentenceOf(error)),
    });
  };

  return (
    <Section
      title="Words"
      lede="They go into the next revision. What you write here holds for this job alone."
      actions={companyWords}
    >
      {wordsKeys.map((key) => {
        const isOwn = own.includes(key);
        return (
          <article key={key} className={styles.text} aria-label={wordsLabel(key)}>
            <div className={styles.textHead}>
              <h3>{wordsLabel(key)}</h3>
              <span className={styles.whose} data-own={isOwn ? '' : undefined}>
                {isOwn ? 'This job’s own' : 'The company’s'}
              </span>
              {editable && editing !== key && (
                <span className={styles.textActions}>
                  {isOwn && (
                    <Button
                      kind="bare"
                      disabled={set.isPending}
                      aria-label={`${wordsLabel(key)}: back to the company’s words`}
                      onClick={() => giveBack(key)}
                    >
                      Back to the company’s
                    </Button>
                  )}
                  <Button
                    kind="bare"
                    aria-label={`${wordsLabel(key)}: edit for this job`}
                    onClick={() => setEditing(key)}
                  >
                    Edit
                  </Button>
                </span>
              )}
            </div>
            {editing === key ? (
              <TextEditor
                textKey={key}
                text={words[key]}
                save={(text) => set.mutateAsync(withOwn(words, own, key, text))}
                onClose={() => setEditing(null)}
              />
            ) : (
              <Paragraphs text={words[key]} />
            )}
          </article>
        );
      })}
    </Section>
  );
}

interface TextEditorProps {
  readonly textKey: WordsKey;
  readonly text: string;
  readonly save: (text: string) => Promise<unknown>;
  readonly onClose: () => void;
}

function TextEditor({ textKey, text, save, onClose }: TextEditorProps) {
  const id = useId();
  const [value, setValue] = useState(text);
  const [busy, setBusy] = useState(false);
  const [error, setError] = useState<unknown>(null);
  const submit = async () => {
    setBusy(true);
    setError(null);
    try {
      await save(value.trim());
      onClose();
    } catch (failure) {
      setError(failure);
    } finally {
      setBusy(false);
    }
  };
  return (
    <div className={styles.textEditor}>
      <label htmlFor={id} className="quiet">
        {wordsHint(textKey)} An empty line begins a paragraph.
      </label>
      <textarea
        id={id}
        // biome-ignore lint/a11y/noAutofocus: the person has just asked to write here
        autoFocus
        rows={Math.min(18, Math.max(5, value.split('\n').length + 2))}
        maxLength={mostLetters[textKey]}
        value={value}
        onChange={(event) => setValue(event.target.value)}
        onKeyDown={(event) => {
          if (event.key === 'Escape' && value === text) onClose();
        }}
      />
      {error !== null && <Problem error={error} />}
      <div className={styles.buttons}>
        <Button kind="strong" busy={busy} disabled={value.trim() === text} onClick={() => void submit()}>
          Save for this job
        </Button>
        <Button onClick={onClose}>Leave it</Button>
      </div>
    </div>
  );
}
