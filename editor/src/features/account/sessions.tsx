import { useQuery } from '@tanstack/react-query';
import { Button } from '../../components/button';
import { Problem, SkeletonRows } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { formatAgo, formatDay } from '../../lib/format';
import styles from './account.module.css';
import { type Session, sessionsQuery, useEndSession, useSignOutEverywhere } from './api';
import { deviceOf } from './user-agent';

const complain = (error: unknown) => void showProblem(sentenceOf(error));

export function Sessions() {
  const sessions = useQuery(sessionsQuery);
  const everywhere = useSignOutEverywhere();
  return (
    <>
      {sessions.isPending && <SkeletonRows rows={2} label="Loading your devices" />}
      {sessions.isError && <Problem error={sessions.error} onRetry={() => sessions.refetch()} />}
      <ul>
        {sessions.data?.map((session) => (
          <SessionRow key={session.id} session={session} />
        ))}
      </ul>
      <p className={styles.body}>
        <Button
          busy={everywhere.isPending}
          onClick={() => everywhere.mutate(undefined, { onError: complain })}
        >
          Sign out everywhere
        </Button>
      </p>
    </>
  );
}

function SessionRow({ session }: { session: Session }) {
  const end = useEndSession();
  const device = deviceOf(session.userAgent);
  return (
    <li className={styles.session}>
      <div>
        <strong>{device}</strong>
        {session.current && <span className="quiet"> · this one</span>}
        <div className={styles.below}>
          Last used {formatAgo(session.lastUsedAt, Date.now())} · signed in on {formatDay(session.createdAt)}
        </div>
      </div>
      {!session.current && (
        <Button
          kind="bare"
          busy={end.isPending}
          aria-label={`Sign out ${device}`}
          onClick={() =>
            end.mutate(session.id, {
              onSuccess: () => showToast({ message: `${device} is signed out.` }),
              onError: complain,
            })
          }
        >
          Sign out
        </Button>
      )}
    </li>
  );
}
