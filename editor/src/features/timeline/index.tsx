import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '../../components/button';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { count, formatDay } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import { timelineQuery } from './api';
import { byDay } from './by-day';
import styles from './timeline.module.css';

/** So many are shown before the rest is asked for. */
const FIRST_SHOWN = 12;

const clock = new Intl.DateTimeFormat(undefined, { hour: 'numeric', minute: '2-digit' });

/** What happened in a job between company and client, newest first. */
export function TimelineSection({ jobId }: { readonly jobId: string }) {
  const timeline = useQuery(timelineQuery(jobId));
  const [all, setAll] = useState(false);
  const events = timeline.data?.items ?? [];
  const shown = all ? events : events.slice(0, FIRST_SHOWN);
  return (
    <Section
      title="Timeline"
      lede={timeline.isSuccess && events.length === 0 ? 'Nothing has happened yet.' : undefined}
    >
      {timeline.isPending && <SkeletonRows rows={3} label="Loading the timeline" />}
      {timeline.isError && <Problem error={timeline.error} onRetry={() => timeline.refetch()} />}
      {timeline.data !== undefined && events.length > 0 && (
        <ol className={styles.days}>
          {byDay(shown).map(({ day, events: ofDay }) => (
            <li key={day}>
              <h3 className={styles.day}>
                <time dateTime={day}>{formatDay(day)}</time>
              </h3>
              <ol className={styles.events}>
                {ofDay.map((event) => (
                  <li key={event.id}>
                    <time dateTime={event.at} className={styles.at}>
                      {clock.format(new Date(event.at))}
                    </time>
                    <span className={styles.what}>
                      {event.sentence}
                      {event.actor !== '' && !event.sentence.includes(event.actor) && (
                        <span className="quiet"> · {event.actor}</span>
                      )}
                    </span>
                    {event.amountMinor !== null && (
                      <span className="figure">{moneyOf(timeline.data)(event.amountMinor)}</span>
                    )}
                  </li>
                ))}
              </ol>
            </li>
          ))}
        </ol>
      )}
      {!all && events.length > shown.length && (
        <p className={styles.more}>
          <Button onClick={() => setAll(true)}>
            Show {count(events.length - shown.length, 'earlier event')}
          </Button>
        </p>
      )}
    </Section>
  );
}
