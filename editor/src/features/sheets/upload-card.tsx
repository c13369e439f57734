import { Button } from '../../components/button';
import styles from './sheets.module.css';
import type { Upload, UploadStep } from './uploads';

interface UploadCardProps {
  readonly upload: Upload;
  readonly onCancel: () => void;
  readonly onRetry: () => void;
}

function wordsFor(step: UploadStep): string {
  switch (step.kind) {
    case 'decoding':
      return 'Decoding the photo';
    case 'sending':
      return step.share < 1 ? `Uploading, ${Math.round(step.share * 100)} %` : 'Arrived, being checked';
    case 'failed':
      return step.sentence;
  }
}

/** A file on its way to the server. */
export function UploadCard({ upload, onCancel, onRetry }: UploadCardProps) {
  const { step } = upload;
  return (
    <li className={styles.card}>
      <div className={styles.picture}>
        <div className={styles.failure}>
          {step.kind !== 'failed' && (
            <div
              className={styles.bar}
              role="progressbar"
              aria-label={`Upload of ${upload.file.name}`}
              aria-valuenow={step.kind === 'sending' ? Math.round(step.share * 100) : undefined}
              data-endless={step.kind === 'decoding' || step.share >= 1 ? '' : undefined}
            >
              <span style={step.kind === 'sending' ? { width: `${step.share * 100}%` } : undefined} />
            </div>
          )}
          <span role={step.kind === 'failed' ? 'alert' : undefined}>{wordsFor(step)}</span>
          {step.kind === 'failed' && step.canRetry && <Button onClick={onRetry}>Try again</Button>}
        </div>
      </div>
      <div className={styles.foot}>
        <div className={styles.words}>
          <div className={styles.name}>{upload.file.name}</div>
          <div className={styles.kind}>{(upload.file.size / 1024 / 1024).toFixed(1)} MB</div>
        </div>
        <Button kind="bare" onClick={onCancel}>
          {step.kind === 'failed' ? 'Close' : 'Cancel'}
        </Button>
      </div>
    </li>
  );
}
