import { useId } from 'react';
import { HowToReach } from './contact';
import { useDraft } from './drafts';
import styles from './review.module.css';
import { decline, type SharedPage } from './share';
import { useAction } from './use-action';

interface Props {
  readonly linkId: string;
  readonly page: SharedPage;
  readonly onBack: () => void;
  readonly onDeclined: (page: SharedPage) => void;
}

/** To say no, and why. */
export function Decline({ linkId, page, onBack, onDeclined }: Props) {
  const { document } = page;
  const [reason, setReason] = useDraft(`${linkId}:decline`, '');
  const id = useId();
  const send = useAction(async () => {
    const declined = await decline(linkId, { revisionId: page.revisionId, reason: reason.trim() });
    setReason('');
    onDeclined(declined);
  });
  return (
    <form
      className={styles.review}
      onSubmit={(event) => {
        event.preventDefault();
        send.run();
      }}
    >
      <button type="button" className="quiet-button" onClick={onBack}>
        ← Back to the proposal
      </button>
      <h1 tabIndex={-1}>Decline the proposal</h1>
      <p>
        {document.company.name} is told, and nothing is done or owed. If something only needs changing, you
        can <HowToReach company={document.company} />.
      </p>
      <div>
        <label className={styles.name} htmlFor={id}>
          Why? One line helps them to do better.
        </label>
        <textarea
          id={id}
          className="field"
          rows={4}
          maxLength={2000}
          value={reason}
          onChange={(event) => setReason(event.target.value)}
        />
      </div>
      {send.trouble && (
        <p className="fault" role="alert">
          {send.trouble.message}
        </p>
      )}
      <button type="submit" className="button" disabled={send.busy}>
        {send.busy ? 'Declining …' : 'Decline the proposal'}
      </button>
    </form>
  );
}
