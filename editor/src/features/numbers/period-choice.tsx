import { useId } from 'react';
import { Select } from '../../components/select';
import styles from './numbers.module.css';
import { type Ask, type Period, type PeriodName, periodLabel, periodNames, periodOf } from './period';

interface PeriodChoiceProps {
  readonly ask: Ask;
  readonly onAsk: (name: PeriodName, period: Period) => void;
}

/** Which time the numbers are of. */
export function PeriodChoice({ ask: { name, period }, onAsk }: PeriodChoiceProps) {
  const id = useId();
  return (
    <div className={styles.period}>
      <Select
        aria-label="Period"
        value={name}
        onChange={(event) => {
          const next = periodNames.find((each) => each === event.target.value) ?? 'year';
          onAsk(next, next === 'own' ? period : periodOf(next, new Date()));
        }}
      >
        {periodNames.map((each) => (
          <option key={each} value={each}>
            {periodLabel(each)}
          </option>
        ))}
      </Select>
      {name === 'own' &&
        (['from', 'to'] as const).map((end) => (
          <span key={end} className={styles.day}>
            <label htmlFor={`${id}-${end}`}>{end === 'from' ? 'From' : 'To'}</label>
            <input
              id={`${id}-${end}`}
              type="date"
              value={period[end]}
              onChange={(event) => {
                if (event.target.value !== '') onAsk('own', { ...period, [end]: event.target.value });
              }}
            />
          </span>
        ))}
    </div>
  );
}
