import { type FormEvent, useId, useState } from 'react';
import { type About, aboutInWords } from '../about';
import { ask, type NewQuestion, type Question, type ShareDocument } from '../share';
import { useAction } from '../use-action';
import type { AskDraft } from './ask-draft';
import styles from './questions.module.css';

interface Props {
  readonly linkId: string;
  readonly document: ShareDocument;
  readonly draft: AskDraft;
  readonly onDraft: (draft: AskDraft) => void;
  readonly onAsked: (question: Question) => void;
}

export const ASK_FIELD = 'ask-text';

/** A new question: about the whole, unless a light or a place was named in the picture. */
export function AskForm({ linkId, document, draft, onDraft, onAsked }: Props) {
  const [missing, setMissing] = useState(false);
  const [sent, setSent] = useState(false);
  const faultId = useId();
  const send = useAction(async () => {
    onAsked(await ask(linkId, questionOf(draft)));
    setSent(true);
  });

  const submit = (event: FormEvent): void => {
    event.preventDefault();
    const empty = draft.text.trim() === '';
    setMissing(empty);
    if (empty) window.document.getElementById(ASK_FIELD)?.focus();
    else send.run();
  };

  const fault = missing ? 'Please write your question.' : (send.trouble?.message ?? null);
  return (
    <form className={styles.ask} onSubmit={submit} noValidate>
      <label htmlFor={ASK_FIELD}>Ask {document.company.name}</label>
      <p className={styles.about}>
        {aboutInWords(document, draft.about)}
        {draft.about.kind !== 'whole' && (
          <button
            type="button"
            className="quiet-button"
            onClick={() => onDraft({ ...draft, about: { kind: 'whole' } })}
          >
            Ask about the whole instead
          </button>
        )}
      </p>
      <textarea
        id={ASK_FIELD}
        className="field"
        rows={3}
        maxLength={4000}
        value={draft.text}
        aria-invalid={fault !== null}
        aria-describedby={fault === null ? undefined : faultId}
        onChange={(event) => {
          setMissing(false);
          setSent(false);
          onDraft({ ...draft, text: event.target.value });
        }}
      />
      {fault !== null && (
        <p id={faultId} className="fault" role="alert">
          {fault}
        </p>
      )}
      <div className={styles.actions}>
        <button type="submit" className="button" disabled={send.busy}>
          {send.busy ? 'Sending …' : 'Send question'}
        </button>
        <span role="status">{sent && 'Sent. The answer comes here and by mail.'}</span>
      </div>
    </form>
  );
}

function questionOf({ about, text }: { readonly about: About; readonly text: string }): NewQuestion {
  const words = text.trim();
  switch (about.kind) {
    case 'whole':
      return { text: words, recordId: null, point: null };
    case 'light':
      return { text: words, recordId: about.recordId, point: null };
    case 'place':
      return { text: words, recordId: null, point: { sheetId: about.sheetId, x: about.x, y: about.y } };
  }
}
