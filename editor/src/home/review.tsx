import { type FormEvent, useId, useState } from 'react';
import type { Choice } from './choice';
import { HowToReach } from './contact';
import { Papers } from './papers';
import styles from './review.module.css';
import { approve, type Combination, type SharedPage } from './share';
import { Sum, Totals } from './totals';
import { problemOf } from './trouble';
import { useAction } from './use-action';
import { dotted, listOf, moneyOf, proposalInWords } from './words';

interface Props {
  readonly linkId: string;
  readonly page: SharedPage;
  readonly choice: Choice;
  readonly sums: Combination;
  readonly onBack: () => void;
  readonly onApproved: (page: SharedPage) => void;
  /** The server says that this is not the proposal any more. */
  readonly onConflict: () => Promise<void>;
}

interface Faults {
  readonly agreed?: string;
  readonly consented?: string;
  readonly typedName?: string;
}

/** All that is agreed to on one screen, and the name under it. */
export function Review({ linkId, page, choice, sums, onBack, onApproved, onConflict }: Props) {
  const { document, sentences } = page;
  const money = moneyOf(document);
  const [agreed, setAgreed] = useState(false);
  const [consented, setConsented] = useState(false);
  const [typedName, setTypedName] = useState('');
  const [faults, setFaults] = useState<Faults>({});
  const id = useId();

  const sign = useAction(async () => {
    try {
      const approved = await approve(linkId, {
        revisionId: page.revisionId,
        hash: page.hash,
        groups: [...sums.groups],
        totalMinor: sums.totalMinor,
        typedName: typedName.trim(),
        agreed: true,
        consented: true,
      });
      onApproved(approved);
    } catch (error) {
      if (problemOf(error).status === 409) await onConflict();
      throw error;
    }
  });

  const submit = (event: FormEvent): void => {
    event.preventDefault();
    const found = faultsOf({ agreed, consented, typedName });
    setFaults(found);
    const first = (['agreed', 'consented', 'typedName'] as const).find((name) => found[name]);
    if (first) window.document.getElementById(`${id}-${first}`)?.focus();
    else sign.run();
  };

  const left = document.price.groups.filter((group) => group.id !== null && !choice.has(group.id));
  return (
    <form className={styles.review} onSubmit={submit} noValidate>
      <button type="button" className="quiet-button" onClick={onBack}>
        ← Back to the proposal
      </button>
      <h1 tabIndex={-1}>Review and approve</h1>
      <p className="quiet">
        {dotted([document.company.name, ...proposalInWords(document), document.job.property])}
      </p>

      <section aria-labelledby={`${id}-taken`}>
        <h2 id={`${id}-taken`}>You take</h2>
        <dl className={styles.taken}>
          {document.price.groups
            .filter((group) => group.id === null || choice.has(group.id))
            .map((group) => (
              <Sum key={group.id ?? 'base'} name={group.name} amount={money(group.priceMinor)} />
            ))}
        </dl>
        {left.length > 0 && <p className="quiet">Not taken: {listOf(left.map(({ name }) => name))}.</p>}
        <Totals document={document} sums={sums} />
        {document.changes && (
          <p className="quiet">
            You approved {money(document.changes.totalMinor)} before. {differenceInWords(page, sums)}
          </p>
        )}
      </section>

      <Papers papers={page.papers} />

      <section aria-labelledby={`${id}-agree`}>
        <h2 id={`${id}-agree`}>Your approval</h2>
        <Tick
          id={`${id}-agreed`}
          sentence={sentences.approval}
          ticked={agreed}
          fault={faults.agreed}
          onTick={(to) => {
            setAgreed(to);
            setFaults({ ...faults, agreed: undefined });
          }}
        />
        <Tick
          id={`${id}-consented`}
          sentence={sentences.consent}
          ticked={consented}
          fault={faults.consented}
          onTick={(to) => {
            setConsented(to);
            setFaults({ ...faults, consented: undefined });
          }}
        />
        <label className={styles.name} htmlFor={`${id}-typedName`}>
          Your full name, as your signature
        </label>
        <input
          id={`${id}-typedName`}
          className="field"
          type="text"
          autoComplete="name"
          maxLength={120}
          value={typedName}
          aria-invalid={faults.typedName !== undefined}
          aria-describedby={faults.typedName ? `${id}-typedName-fault` : undefined}
          onChange={(event) => {
            setTypedName(event.target.value);
            setFaults({ ...faults, typedName: undefined });
          }}
        />
        {faults.typedName && (
          <p id={`${id}-typedName-fault`} className="fault">
            {faults.typedName}
          </p>
        )}
      </section>

      {sign.trouble && (
        <p className="fault" role="alert">
          {sign.trouble.message}
        </p>
      )}
      <button type="submit" className="lamp-button" disabled={sign.busy}>
        {sign.busy ? 'Approving …' : `Approve for ${money(sums.totalMinor)}`}
      </button>
      <p className="quiet">
        Not sure yet? You can <HowToReach company={document.company} />.
      </p>
    </form>
  );
}

function faultsOf({
  agreed,
  consented,
  typedName,
}: {
  readonly agreed: boolean;
  readonly consented: boolean;
  readonly typedName: string;
}): Faults {
  return {
    ...(agreed ? {} : { agreed: 'Please confirm that you approve.' }),
    ...(consented ? {} : { consented: 'Please confirm that electronic records are fine with you.' }),
    ...(typedName.trim().length >= 2 ? {} : { typedName: 'Please type your full name.' }),
  };
}

function differenceInWords({ document }: SharedPage, { totalMinor }: Combination): string {
  const by = totalMinor - (document.changes?.totalMinor ?? 0);
  if (by === 0) return 'The sum stays the same.';
  return `This is ${moneyOf(document)(Math.abs(by))} ${by > 0 ? 'more' : 'less'}.`;
}

interface TickProps {
  readonly id: string;
  readonly sentence: string;
  readonly ticked: boolean;
  readonly fault: string | undefined;
  readonly onTick: (ticked: boolean) => void;
}

function Tick({ id, sentence, ticked, fault, onTick }: TickProps) {
  return (
    <div className={styles.tick}>
      <label>
        <input
          id={id}
          type="checkbox"
          className="check"
          checked={ticked}
          aria-invalid={fault !== undefined}
          aria-describedby={fault ? `${id}-fault` : undefined}
          onChange={(event) => onTick(event.target.checked)}
        />
        <span>{sentence}</span>
      </label>
      {fault && (
        <p id={`${id}-fault`} className="fault">
          {fault}
        </p>
      )}
    </div>
  );
}
