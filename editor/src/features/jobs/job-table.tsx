import { Link } from 'react-router-dom';
import { PlanState } from '../../components/plan-state';
import { SortHead, Table } from '../../components/table';
import { formatAgo, formatMoment } from '../../lib/format';
import { stageLabel } from '../../lib/stages';
import type { ListedJob } from './api';
import styles from './jobs.module.css';
import type { ListAsk, Sort } from './list-ask';

interface JobTableProps {
  readonly jobs: readonly ListedJob[];
  readonly ask: ListAsk;
  /** Where a job's name leads. */
  readonly hrefOf: (jobId: string) => string;
  readonly onSort: (sort: Sort) => void;
  /** The rows are of the former question; the answer is on its way. */
  readonly stale: boolean;
}

export function JobTable({ jobs, ask, hrefOf, onSort, stale }: JobTableProps) {
  const sorted = (sort: Sort) => (ask.sort === sort ? ask.direction : null);
  const now = Date.now();
  return (
    <div className={styles.table} data-stale={stale ? '' : undefined}>
      <Table label="Jobs">
        <thead>
          <tr>
            <th scope="col" className={styles.thumbnailCell}>
              <span className="visually-hidden">Sheet</span>
            </th>
            <SortHead label="Job" sorted={sorted('name')} onSort={() => onSort('name')} />
            <th scope="col" className={styles.wide}>
              Client and property
            </th>
            <SortHead
              label="Stage"
              className={styles.wide}
              sorted={sorted('stage')}
              onSort={() => onSort('stage')}
            />
            <th scope="col">Plan</th>
            <SortHead
              label="Changed"
              className={styles.wide}
              sorted={sorted('updated')}
              onSort={() => onSort('updated')}
            />
          </tr>
        </thead>
        <tbody>
          {jobs.map((job) => (
            <tr key={job.id} className={styles.row}>
              <td className={styles.thumbnailCell}>
                <Thumbnail url={job.thumbnailUrl} />
              </td>
              <td>
                <Link to={hrefOf(job.id)} className={styles.name}>
                  {job.name}
                </Link>
                <div className={styles.below}>
                  <span className={styles.phoneOnly}>
                    {job.client.name} · {stageLabel(job.stage)}
                  </span>
                  {job.existingSystem && <span>Existing system</span>}
                </div>
              </td>
              <td className={styles.wide}>
                {job.client.name}
                <div className={styles.below}>{job.property.address || job.property.name}</div>
              </td>
              <td className={styles.wide}>{stageLabel(job.stage)}</td>
              <td>
                <PlanState faults={job.faults} cautions={job.cautions} fixtures={job.fixtures} />
              </td>
              <td className={styles.wide}>
                <time dateTime={job.updatedAt} title={formatMoment(job.updatedAt)} className={styles.when}>
                  {formatAgo(job.updatedAt, now)}
                </time>
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
    </div>
  );
}

function Thumbnail({ url }: { url: string | null }) {
  if (url !== null)
    return <img src={url} alt="" className={styles.thumbnail} width="72" height="54" loading="lazy" />;
  return (
    <span className={styles.thumbnail}>
      <svg
        viewBox="0 0 24 24"
        width="20"
        height="20"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.4"
        aria-hidden="true"
      >
        <path d="M4 18.5h16M6 18.5V10l6-4.5 6 4.5v8.5" />
      </svg>
    </span>
  );
}
