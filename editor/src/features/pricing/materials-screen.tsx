import { scheduleOf } from '@lampwright/geometry/price';
import { useQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { materialsQuery, planQuery } from './api';
import { MaterialsPart } from './materials-part';
import { SchedulePart } from './schedule-part';
import styles from './screen.module.css';

interface MaterialsScreenProps {
  readonly jobId: string;
  readonly jobName: string;
  readonly jobTo: string;
  readonly planHref: (recordIds: readonly string[]) => string;
}

/** What a job needs, for those who build it. */
export function MaterialsScreen({ jobId, jobName, jobTo, planHref }: MaterialsScreenProps) {
  const materials = useQuery(materialsQuery(jobId));
  const plan = useQuery(planQuery(jobId));
  const [search] = useSearchParams();
  const part = search.get('part') === 'schedule' ? 'schedule' : 'materials';
  const shown = part === 'schedule' ? plan : materials;
  return (
    <Page title="Materials" tabTitle={`Materials of ${jobName}`} back={{ to: jobTo, label: jobName }}>
      <nav className={styles.tabs} aria-label="Parts of the materials">
        <Link to="?" replace className={styles.tab} aria-current={part === 'materials' ? 'page' : undefined}>
          Materials
        </Link>
        <Link
          to="?part=schedule"
          replace
          className={styles.tab}
          aria-current={part === 'schedule' ? 'page' : undefined}
        >
          Schedule
        </Link>
      </nav>
      {shown.isPending && <SkeletonRows rows={8} label="Loading the materials" />}
      {shown.isError && <Problem error={shown.error} onRetry={() => void shown.refetch()} />}
      {part === 'materials' && materials.data && (
        <MaterialsPart materials={materials.data} planHref={planHref} />
      )}
      {part === 'schedule' && plan.data && (
        <SchedulePart rows={scheduleOf(plan.data.doc)} planHref={planHref} />
      )}
    </Page>
  );
}
