import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { Section } from '../../components/page';
import { Problem } from '../../components/states';
import type { Sheet } from '../../lib/sheets';
import { sheetsQuery, useRefreshSheets } from './api';
import { DropZones } from './drop-zones';
import { SheetCard } from './sheet-card';
import styles from './sheets.module.css';
import { UploadCard } from './upload-card';
import { useUploads } from './uploads';

interface SheetsSectionProps {
  readonly jobId: string;
  /** As the job told them. */
  readonly initial: readonly Sheet[];
  readonly editable: boolean;
  readonly planHref: (sheetId: string) => string;
}

const countReady = (sheets: readonly Sheet[]): number =>
  sheets.filter(({ status }) => status === 'ready').length;

/** The job's yard photos and plot plans, those on their way, and where to add more. */
export function SheetsSection({ jobId, initial, editable, planHref }: SheetsSectionProps) {
  const sheets = useQuery(sheetsQuery(jobId, initial));
  const refresh = useRefreshSheets(jobId);
  const { uploads, add, cancel, retry } = useUploads(jobId, () => void refresh());
  const shown = sheets.data ?? initial;
  // The job tells of its sheets too: once one is ready there, the page offers the plan.
  const ready = countReady(shown);
  const known = countReady(initial);
  const refreshed = useRef(refresh);
  refreshed.current = refresh;
  useEffect(() => {
    if (ready !== known) void refreshed.current();
  }, [ready, known]);
  const none = shown.length === 0 && uploads.length === 0;
  return (
    <Section
      title="Sheets"
      lede={
        none
          ? editable
            ? 'The plan is drawn over a yard photo or a plot plan. Add one to begin.'
            : 'No sheet yet. An owner or designer adds the yard photo or plot plan.'
          : undefined
      }
    >
      {sheets.isError && <Problem error={sheets.error} onRetry={() => sheets.refetch()} />}
      {!none && (
        <ul className={styles.grid}>
          {shown.map((sheet) => (
            <SheetCard
              key={sheet.id}
              jobId={jobId}
              sheet={sheet}
              editable={editable}
              planHref={planHref(sheet.id)}
            />
          ))}
          {uploads.map((upload) => (
            <UploadCard
              key={upload.id}
              upload={upload}
              onCancel={() => cancel(upload.id)}
              onRetry={() => void retry(upload)}
            />
          ))}
        </ul>
      )}
      {editable && <DropZones onFiles={add} />}
    </Section>
  );
}
