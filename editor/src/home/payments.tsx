import styles from './payments.module.css';
import type { Returned } from './returned';
import { checkout, type Due, type SharedPage } from './share';
import { useAction } from './use-action';
import { dueInWords, moneyOf } from './words';

interface Props {
  readonly linkId: string;
  readonly page: SharedPage;
  /** They came back from the card service's page. */
  readonly returned: Returned | null;
  /** The page has stopped asking by itself. */
  readonly tired: boolean;
  readonly onCheck: () => void;
  /** Something else is what moves things on now. */
  readonly aside?: boolean;
}

/** What is to be paid, and what is known about it. That a card was charged is known from the server alone. */
export function Payments({ linkId, page, returned, tired, onCheck, aside = false }: Props) {
  const { dues, document } = page;
  if (dues.length === 0) return null;
  const next = dues.find(({ payable, outstandingMinor }) => payable && outstandingMinor > 0);
  return (
    <section aria-labelledby="payments">
      <h2 id="payments">Payment</h2>
      <ul className={styles.dues}>
        {dues.map((due) => (
          <li key={due.id} className={styles.due}>
            <DueRow
              linkId={linkId}
              due={due}
              document={document}
              main={!aside && due.id === next?.id}
              returned={returned !== null && (returned.dueId === null || returned.dueId === due.id)}
              tired={tired}
              onCheck={onCheck}
            />
          </li>
        ))}
      </ul>
    </section>
  );
}

interface RowProps {
  readonly linkId: string;
  readonly due: Due;
  readonly document: SharedPage['document'];
  /** Its button is the one of the screen. */
  readonly main: boolean;
  readonly returned: boolean;
  readonly tired: boolean;
  readonly onCheck: () => void;
}

function DueRow({ linkId, due, document, main, returned, tired, onCheck }: RowProps) {
  const money = moneyOf(document);
  const pay = useAction(async () => {
    const { url } = await checkout(linkId, due.id);
    window.location.assign(url);
  });
  const word = wordOf(due, returned);
  return (
    <>
      <div className={styles.sum}>
        <span>
          {due.name}
          {!due.requested && <span className="quiet"> {dueInWords(due.due)}</span>}
        </span>
        <strong>{money(due.amountMinor)}</strong>
      </div>
      {due.paidMinor > 0 && due.outstandingMinor > 0 && (
        <p className="quiet">
          {money(due.paidMinor)} paid, {money(due.outstandingMinor)} to pay.
        </p>
      )}
      <p role="status" className={styles.word}>
        {sentenceOf(word)}
      </p>
      <div className={styles.actions}>
        {due.payable && due.outstandingMinor > 0 && word !== 'later' && (word !== 'waiting' || tired) && (
          <button
            type="button"
            className={main && word !== 'waiting' ? 'lamp-button' : 'button'}
            disabled={pay.busy}
            onClick={() => pay.run()}
          >
            {pay.busy ? 'One moment …' : buttonOf(word, money(due.outstandingMinor))}
          </button>
        )}
        {word === 'waiting' && tired && (
          <button type="button" className="button" onClick={onCheck}>
            Check again
          </button>
        )}
      </div>
      {pay.trouble && (
        <p className="fault" role="alert">
          {pay.trouble.message}
        </p>
      )}
    </>
  );
}

type Word = 'paid' | 'waiting' | 'begun' | 'failed' | 'open' | 'by-hand' | 'later';

function wordOf({ outstandingMinor, pending, payable, requested }: Due, returned: boolean): Word {
  if (outstandingMinor <= 0) return 'paid';
  if (pending) return returned ? 'waiting' : 'begun';
  if (!requested) return 'later';
  if (!payable) return 'by-hand';
  return returned ? 'failed' : 'open';
}

function sentenceOf(word: Word): string {
  switch (word) {
    case 'paid':
      return 'Paid, thank you. The receipt comes by mail.';
    case 'waiting':
      return 'We are waiting for the card service’s word. This page shows it as soon as it comes; you can also close it.';
    case 'begun':
      return 'A card payment was begun and is not finished.';
    case 'failed':
      return 'The card payment did not go through, and nothing was charged. Please try again.';
    case 'later':
      return 'You are asked for it when it is due.';
    case 'by-hand':
      return 'Please pay by transfer or cheque, as the invoice says. It shows here once the company has it.';
    case 'open':
      return '';
  }
}

function buttonOf(word: Word, amount: string): string {
  switch (word) {
    case 'failed':
      return `Try again: pay ${amount} by card`;
    case 'waiting':
    case 'begun':
      return 'Go on with the payment';
    case 'open':
    case 'paid':
    case 'by-hand':
    case 'later':
      return `Pay ${amount} by card`;
  }
}
