import { DropdownMenu } from '@radix-ui/themes';
import { useId } from 'react';
import { Link } from 'react-router-dom';
import { Button } from '../../components/button';
import { MoreIcon } from '../../components/icons';
import { Select } from '../../components/select';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { count } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import { proposalWord } from '../../lib/proposal-states';
import { type Stage, stageLabel, stageMeaning, stageOptions, stageSchema, stages } from '../../lib/stages';
import { useMoveJob } from './api';
import styles from './board.module.css';
import type { Board, Card, Column } from './move';

interface BoardProps {
  readonly board: Board;
  readonly editable: boolean;
  /** The column that a phone shows. */
  readonly stage: Stage;
  readonly onStage: (stage: Stage) => void;
  readonly hrefOf: (jobId: string) => string;
  /** The list of all jobs of a stage, for columns that don't hold all. */
  readonly listHref: (stage: Stage) => string;
}

/** Jobs by stage, side by side; on a phone one stage at a time. */
export function BoardView({ board, editable, stage, onStage, hrefOf, listHref }: BoardProps) {
  const id = useId();
  const move = useMoveJob();

  const moveTo = (card: Card, to: Stage) =>
    move.mutate(
      { jobId: card.jobId, to },
      {
        onSuccess: () =>
          showToast({
            message: `${card.name} is in ${stageLabel(to)}.`,
            undo: () => move.mutateAsync({ jobId: card.jobId, to: card.stage }),
          }),
        onError: (error) => void showProblem(sentenceOf(error)),
      },
    );

  return (
    <>
      <div className={styles.chooser}>
        <label htmlFor={id}>Stage</label>
        <Select id={id} value={stage} onChange={(event) => onStage(stageSchema.parse(event.target.value))}>
          {board.columns.map((column) => (
            <option key={column.stage} value={column.stage}>
              {stageLabel(column.stage)} · {column.count}
            </option>
          ))}
        </Select>
      </div>
      <div className={styles.board}>
        {board.columns.map((column) => (
          <StageColumn
            key={column.stage}
            column={column}
            board={board}
            editable={editable}
            chosen={column.stage === stage}
            hrefOf={hrefOf}
            listHref={listHref(column.stage)}
            onMove={moveTo}
          />
        ))}
      </div>
    </>
  );
}

interface ColumnProps {
  readonly column: Column;
  readonly board: Board;
  readonly editable: boolean;
  readonly chosen: boolean;
  readonly hrefOf: (jobId: string) => string;
  readonly listHref: string;
  readonly onMove: (card: Card, to: Stage) => void;
}

function StageColumn({ column, board, editable, chosen, hrefOf, listHref, onMove }: ColumnProps) {
  const id = useId();
  const { stage, cards } = column;
  return (
    <section
      className={styles.column}
      aria-labelledby={id}
      data-chosen={chosen ? '' : undefined}
      data-empty={cards.length === 0 ? '' : undefined}
    >
      <h2 id={id} className={styles.head} title={stageMeaning(stage)}>
        {stageLabel(stage)} <span className="quiet">{column.count}</span>
      </h2>
      {cards.length === 0 ? (
        <p className={styles.none}>No job here.</p>
      ) : (
        <ol className={styles.cards}>
          {cards.map((card) => (
            <JobCard
              key={card.jobId}
              card={card}
              board={board}
              editable={editable}
              href={hrefOf(card.jobId)}
              onMove={onMove}
            />
          ))}
        </ol>
      )}
      {column.count > cards.length && (
        <Link to={listHref} className={styles.rest}>
          {count(column.count - cards.length, 'more job')}
        </Link>
      )}
    </section>
  );
}

interface CardProps {
  readonly card: Card;
  readonly board: Board;
  readonly editable: boolean;
  readonly href: string;
  readonly onMove: (card: Card, to: Stage) => void;
}

function JobCard({ card, board, editable, href, onMove }: CardProps) {
  const money = moneyOf(board);
  return (
    <li className={styles.card}>
      <div className={styles.cardHead}>
        <Link to={href} className={styles.name}>
          {card.name}
        </Link>
        {editable && (
          <DropdownMenu.Root>
            <DropdownMenu.Trigger>
              <Button kind="bare" icon aria-label={`Move ${card.name} to another stage`}>
                <MoreIcon />
              </Button>
            </DropdownMenu.Trigger>
            <DropdownMenu.Content align="end" color="gray">
              <DropdownMenu.Label>Move to</DropdownMenu.Label>
              {stageOptions.map(({ value, label }) => (
                <DropdownMenu.Item
                  key={value}
                  disabled={value === card.stage}
                  onSelect={() => onMove(card, stageSchema.parse(value))}
                >
                  {stages.indexOf(value) + 1}. {label}
                </DropdownMenu.Item>
              ))}
            </DropdownMenu.Content>
          </DropdownMenu.Root>
        )}
      </div>
      <p className={styles.client}>{card.client}</p>
      {card.proposal !== null && card.proposal !== 'draft' && (
        <p className={styles.fact}>
          Proposal: {proposalWord(card.proposal).toLowerCase()}
          {card.totalMinor !== null && <>, {money(card.totalMinor)}</>}
        </p>
      )}
      {card.openQuestions > 0 && (
        <p className={styles.fact}>
          <strong>{count(card.openQuestions, 'open question')}</strong>
        </p>
      )}
      {card.outstandingMinor !== null && card.outstandingMinor > 0 && (
        <p className={styles.fact}>{money(card.outstandingMinor)} still to pay</p>
      )}
      {card.next.what !== '' && (
        <p className={styles.next} data-by={card.next.by}>
          <span>{card.next.by === 'company' ? 'We' : 'Client'}</span>
          {card.next.what}
        </p>
      )}
    </li>
  );
}
