import { type About, aboutInWords, aboutOf, isWaiting } from '../about';
import { useDraft } from '../drafts';
import { type Question, reply, type SharedPage } from '../share';
import { useAction } from '../use-action';
import { momentOf } from '../words';
import { type AskDraft, emptyDraft } from './ask-draft';
import { AskForm } from './ask-form';
import styles from './questions.module.css';

interface Props {
  readonly linkId: string;
  readonly page: SharedPage;
  readonly canAsk: boolean;
  readonly draft: AskDraft;
  readonly onDraft: (draft: AskDraft) => void;
  readonly onQuestion: (question: Question) => void;
  readonly onShow: (about: About) => void;
}

/** What was asked and answered, and a place to ask. */
export function Questions({ linkId, page, canAsk, draft, onDraft, onQuestion, onShow }: Props) {
  const { questions, document } = page;
  if (!canAsk && questions.length === 0) return null;
  return (
    <section aria-labelledby="questions">
      <h2 id="questions">Questions</h2>
      {questions.length > 0 && (
        <ul className={styles.threads}>
          {questions.map((question) => (
            <Thread
              key={question.id}
              linkId={linkId}
              page={page}
              question={question}
              canReply={canAsk}
              onQuestion={onQuestion}
              onShow={onShow}
            />
          ))}
        </ul>
      )}
      {canAsk && (
        <AskForm
          linkId={linkId}
          document={document}
          draft={draft}
          onDraft={onDraft}
          onAsked={(question) => {
            onDraft(emptyDraft);
            onQuestion(question);
          }}
        />
      )}
    </section>
  );
}

interface ThreadProps {
  readonly linkId: string;
  readonly page: SharedPage;
  readonly question: Question;
  readonly canReply: boolean;
  readonly onQuestion: (question: Question) => void;
  readonly onShow: (about: About) => void;
}

function Thread({ linkId, page, question, canReply, onQuestion, onShow }: ThreadProps) {
  const { document } = page;
  const about = aboutOf(question);
  const title = aboutInWords(document, about);
  const state =
    question.resolvedAt !== null ? 'Answered' : isWaiting(question) ? 'Waiting for an answer' : null;
  return (
    <li id={`question-${question.id}`} className={styles.thread} tabIndex={-1}>
      <div className={styles.head}>
        <h3>{title}</h3>
        {state && <span className="quiet">{state}</span>}
      </div>
      <ol className={styles.messages}>
        {question.messages.map(({ id, side, authorName, text, at }) => (
          <li key={id} className={styles.message} data-side={side}>
            <p className={styles.author}>
              <strong>{authorName || (side === 'company' ? document.company.name : 'You')}</strong>{' '}
              <span className="quiet">{momentOf(at, document.locale)}</span>
            </p>
            <p className={styles.text}>{text}</p>
          </li>
        ))}
      </ol>
      <div className={styles.actions}>
        {about.kind !== 'whole' && (
          <button type="button" className="quiet-button" onClick={() => onShow(about)}>
            Show in the picture
          </button>
        )}
        {canReply && <Reply linkId={linkId} question={question} title={title} onQuestion={onQuestion} />}
      </div>
    </li>
  );
}

interface ReplyProps {
  readonly linkId: string;
  readonly question: Question;
  readonly title: string;
  readonly onQuestion: (question: Question) => void;
}

function Reply({ linkId, question, title, onQuestion }: ReplyProps) {
  const [text, setText] = useDraft(`${linkId}:reply:${question.id}`, '');
  const send = useAction(async () => {
    const answered = await reply(linkId, question.id, text.trim());
    setText('');
    onQuestion(answered);
  });
  return (
    <details className={styles.reply} open={text !== '' || undefined}>
      <summary>Reply</summary>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          if (text.trim() !== '') send.run();
        }}
      >
        <textarea
          className="field"
          rows={3}
          maxLength={4000}
          aria-label={`Reply: ${title}`}
          value={text}
          onChange={(event) => setText(event.target.value)}
        />
        {send.trouble && (
          <p className="fault" role="alert">
            {send.trouble.message}
          </p>
        )}
        <button type="submit" className="button" disabled={send.busy || text.trim() === ''}>
          {send.busy ? 'Sending …' : 'Send reply'}
        </button>
      </form>
    </details>
  );
}
