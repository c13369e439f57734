import { SearchBox } from '../../components/search-box';
import { Select } from '../../components/select';
import { stageOptions, stageSchema } from '../../lib/stages';
import styles from './jobs.module.css';
import { changeAsk, type ListAsk } from './list-ask';

interface JobFiltersProps {
  readonly ask: ListAsk;
  readonly onAsk: (ask: ListAsk) => void;
}

export function JobFilters({ ask, onAsk }: JobFiltersProps) {
  return (
    <div className={styles.filters}>
      <SearchBox
        label="Search jobs, clients, addresses"
        value={ask.search}
        onSearch={(search) => onAsk(changeAsk(ask, { search }))}
      />
      <Select
        aria-label="Stage"
        value={ask.stage ?? ''}
        onChange={(event) => {
          const stage = stageSchema.safeParse(event.target.value);
          onAsk(changeAsk(ask, { stage: stage.success ? stage.data : null }));
        }}
      >
        <option value="">Every stage</option>
        {stageOptions.map(({ value, label }) => (
          <option key={value} value={value}>
            {label}
          </option>
        ))}
      </Select>
      <Select
        aria-label="Which jobs"
        value={ask.archived ? 'archived' : 'current'}
        onChange={(event) => onAsk(changeAsk(ask, { archived: event.target.value === 'archived' }))}
      >
        <option value="current">Current jobs</option>
        <option value="archived">Archived jobs</option>
      </Select>
    </div>
  );
}
