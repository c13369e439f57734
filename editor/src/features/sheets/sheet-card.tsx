import { type ReactNode, useState } from 'react';
import { Link } from 'react-router-dom';
import { Button } from '../../components/button';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { showProblem } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import type { Sheet } from '../../lib/sheets';
import { useRetrySheet } from './api';
import { PagePicker } from './page-picker';
import { RemoveSheet } from './remove-sheet';
import { RenameSheet } from './rename-sheet';
import styles from './sheets.module.css';

interface SheetCardProps {
  readonly jobId: string;
  readonly sheet: Sheet;
  readonly editable: boolean;
  /** Where its picture leads: the plan, on this sheet. */
  readonly planHref: string;
}

type Asking = 'page' | 'name' | 'removal' | null;

export function SheetCard({ jobId, sheet, editable, planHref }: SheetCardProps) {
  const [asking, setAsking] = useState<Asking>(null);
  const during = (what: Asking) => ({
    open: asking === what,
    onOpenChange: (open: boolean) => setAsking(open ? what : null),
  });
  return (
    <li className={styles.card}>
      <Picture
        jobId={jobId}
        sheet={sheet}
        editable={editable}
        planHref={planHref}
        onChoosePage={() => setAsking('page')}
      />
      <div className={styles.foot}>
        <div className={styles.words}>
          <div className={styles.name} title={sheet.name}>
            {sheet.name}
          </div>
          <div className={styles.kind}>{sheet.view === 'photo' ? 'Yard photo' : 'Plot plan'}</div>
        </div>
        {editable && (
          <MoreMenu label={`More for ${sheet.name}`}>
            <MenuItem onSelect={() => setAsking('name')}>Rename</MenuItem>
            <MenuItem onSelect={() => setAsking('removal')}>Remove…</MenuItem>
          </MoreMenu>
        )}
      </div>
      {editable && (
        <>
          <PagePicker jobId={jobId} sheet={sheet} {...during('page')} />
          <RenameSheet jobId={jobId} sheet={sheet} {...during('name')} />
          <RemoveSheet jobId={jobId} sheet={sheet} {...during('removal')} />
        </>
      )}
    </li>
  );
}

interface PictureProps extends SheetCardProps {
  readonly onChoosePage: () => void;
}

function Picture({ jobId, sheet, editable, planHref, onChoosePage }: PictureProps): ReactNode {
  const retry = useRetrySheet(jobId, sheet.id);
  switch (sheet.status) {
    case 'ready':
      return (
        <Link to={planHref} className={styles.picture} aria-label={`Open ${sheet.name} in the plan`}>
          {sheet.thumbnailUrl && <img src={sheet.thumbnailUrl} alt="" loading="lazy" />}
        </Link>
      );
    case 'uploaded':
    case 'processing':
      return (
        <div className={styles.picture} role="status">
          <div className={styles.failure}>
            <div className={styles.bar} data-endless="">
              <span />
            </div>
            {sheet.status === 'uploaded' ? 'Waiting its turn' : 'Being made ready'}
          </div>
        </div>
      );
    case 'choose-page':
      return (
        <div className={styles.picture}>
          <div className={styles.failure}>
            {sheet.pageCount} pages
            {editable && (
              <Button kind="strong" onClick={onChoosePage}>
                Choose the page
              </Button>
            )}
          </div>
        </div>
      );
    case 'failed':
      return (
        <div className={styles.picture}>
          <div className={styles.failure} role="alert">
            {sheet.failure ?? 'This file could not be used.'}
            {editable && sheet.canRetry && (
              <Button
                busy={retry.isPending}
                onClick={() =>
                  retry.mutate(undefined, { onError: (error) => void showProblem(sentenceOf(error)) })
                }
              >
                Try again
              </Button>
            )}
          </div>
        </div>
      );
  }
}
