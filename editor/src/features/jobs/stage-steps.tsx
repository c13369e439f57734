import { useId } from 'react';
import { Select } from '../../components/select';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { stageCautions } from '../../lib/cautions';
import type { Job } from '../../lib/jobs';
import { useMe } from '../../lib/me';
import { type Stage, stageLabel, stageMeaning, stageOptions, stageSchema, stages } from '../../lib/stages';
import { useEditJob } from './api';
import styles from './job-page.module.css';

/** How far the job is, and the way to say that it has moved; with undo rather than a question. */
export function StageSteps({ job, editable }: { job: Job; editable: boolean }) {
  const id = useId();
  const device = useMe().company?.words.protectiveDevice ?? 'GFCI';
  const edit = useEditJob(job.id);
  const at = stages.indexOf(job.stage);

  const move = (stage: Stage) => {
    const before = job.stage;
    edit.mutate(
      { stage },
      {
        onSuccess: () =>
          showToast({
            message: `${job.name} is in ${stageLabel(stage)}.`,
            undo: () => edit.mutateAsync({ stage: before }),
          }),
        onError: (error) => void showProblem(sentenceOf(error)),
      },
    );
  };

  return (
    <div className={styles.stage}>
      <label htmlFor={id} className={styles.stageLabel}>
        Stage
      </label>
      {editable ? (
        <Select
          id={id}
          value={job.stage}
          disabled={edit.isPending}
          onChange={(event) => move(stageSchema.parse(event.target.value))}
        >
          {stageOptions.map(({ value, label }, i) => (
            <option key={value} value={value}>
              {i + 1}. {label}
            </option>
          ))}
        </Select>
      ) : (
        <output id={id} className={styles.stageNow}>
          {at + 1}. {stageLabel(job.stage)}
        </output>
      )}
      <div className={styles.steps} aria-hidden="true">
        {stages.map((stage, i) => (
          <span key={stage} data-done={i < at ? '' : undefined} data-now={i === at ? '' : undefined} />
        ))}
      </div>
      <p className={styles.meaning}>{stageMeaning(job.stage)}</p>
      <ul className={styles.cautions} aria-label="Cautions">
        {stageCautions(job.stage, device).map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
    </div>
  );
}
