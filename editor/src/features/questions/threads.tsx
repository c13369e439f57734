import { useEffect, useId, useRef, useState } from 'react';
import { Button } from '../../components/button';
import { Problem } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import type { Question } from '../../lib/affairs';
import { sentenceOf } from '../../lib/api/client';
import { formatMoment } from '../../lib/format';
import { aboutOf, inOrder, type Names } from './about';
import { useAnswer, useReopen, useResolve } from './api';
import styles from './questions.module.css';

interface ThreadsProps {
  readonly jobId: string;
  readonly questions: readonly Question[];
  readonly names: Names;
  readonly editable: boolean;
  /** Brings what a question is about into view; absent where there is no drawing beside it. */
  readonly onShow?: (question: Question) => void;
  /** The question that was pointed at. */
  readonly chosenId?: string | null;
}

/** Questions and answers, one thread each. */
export function Threads({ jobId, questions, names, editable, onShow, chosenId = null }: ThreadsProps) {
  return (
    <ol className={styles.threads}>
      {inOrder(questions).map((question) => (
        <Thread
          key={question.id}
          jobId={jobId}
          question={question}
          about={aboutOf(question, names)}
          editable={editable}
          onShow={
            onShow !== undefined && (question.recordId !== null || question.sheetId !== null)
              ? () => onShow(question)
              : null
          }
          chosen={question.id === chosenId}
        />
      ))}
    </ol>
  );
}

interface ThreadProps {
  readonly jobId: string;
  readonly question: Question;
  readonly about: string;
  readonly editable: boolean;
  readonly onShow: (() => void) | null;
  readonly chosen: boolean;
}

function Thread({ jobId, question, about, editable, onShow, chosen }: ThreadProps) {
  const resolve = useResolve(jobId);
  const reopen = useReopen(jobId);
  const complain = (error: unknown) => void showProblem(sentenceOf(error));
  const open = question.resolvedAt === null;
  const item = useRef<HTMLLIElement>(null);
  useEffect(() => {
    if (chosen) item.current?.scrollIntoView({ block: 'nearest' });
  }, [chosen]);
  const close = () =>
    resolve.mutate(question.id, {
      onSuccess: () =>
        showToast({ message: 'The question is settled.', undo: () => reopen.mutateAsync(question.id) }),
      onError: complain,
    });
  return (
    <li
      ref={item}
      className={styles.thread}
      data-open={open ? '' : undefined}
      data-chosen={chosen ? '' : undefined}
    >
      <div className={styles.head}>
        <h3>{about}</h3>
        <span className={styles.state}>{open ? 'Open' : 'Settled'}</span>
        <span className={styles.actions}>
          {onShow !== null && (
            <Button kind="bare" onClick={onShow} aria-label={`Show on the plan: ${about}`}>
              Show
            </Button>
          )}
          {editable && open && (
            <Button kind="bare" busy={resolve.isPending} aria-label={`Settle: ${about}`} onClick={close}>
              Settle
            </Button>
          )}
          {editable && !open && (
            <Button
              kind="bare"
              busy={reopen.isPending}
              aria-label={`Open again: ${about}`}
              onClick={() => reopen.mutate(question.id, { onError: complain })}
            >
              Open again
            </Button>
          )}
        </span>
      </div>
      <ol className={styles.messages}>
        {question.messages.map((message) => (
          <li key={message.id} data-side={message.side}>
            <p className={styles.by}>
              <strong>{message.authorName}</strong>{' '}
              <time dateTime={message.at}>{formatMoment(message.at)}</time>
            </p>
            <p className={styles.said}>{message.text}</p>
          </li>
        ))}
      </ol>
      {editable && open && <AnswerForm jobId={jobId} questionId={question.id} about={about} />}
    </li>
  );
}

const MOST_LETTERS = 4000;

function AnswerForm({
  jobId,
  questionId,
  about,
}: {
  readonly jobId: string;
  readonly questionId: string;
  readonly about: string;
}) {
  const id = useId();
  const [text, setText] = useState('');
  const send = useAnswer(jobId);
  return (
    <form
      className={styles.answer}
      onSubmit={(event) => {
        event.preventDefault();
        if (send.isPending || text.trim() === '') return;
        send.mutate({ questionId, text: text.trim() }, { onSuccess: () => setText('') });
      }}
    >
      <label htmlFor={id} className="visually-hidden">
        Your answer about {about}
      </label>
      <textarea
        id={id}
        rows={2}
        maxLength={MOST_LETTERS}
        placeholder="Your answer"
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
      {send.isError && <Problem error={send.error} />}
      <Button type="submit" kind="strong" busy={send.isPending} disabled={text.trim() === ''}>
        Send the answer
      </Button>
    </form>
  );
}
