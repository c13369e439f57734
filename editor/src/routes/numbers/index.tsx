import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { Page } from '../../components/page';
import { Empty, Problem, SkeletonRows } from '../../components/states';
import { showProblem } from '../../components/toast';
import { Figures } from '../../features/numbers';
import { numbersQuery, useExportPayments } from '../../features/numbers/api';
import { isEmpty } from '../../features/numbers/figures';
import { readPeriod, writePeriod } from '../../features/numbers/period';
import { PeriodChoice } from '../../features/numbers/period-choice';
import { sentenceOf } from '../../lib/api/client';
import { formatDay } from '../../lib/format';
import { useAbilities } from '../../lib/me';
import NotForYou from '../not-for-you';

export default function NumbersScreen() {
  const { seeNumbers } = useAbilities();
  return seeNumbers ? <NumbersPage /> : <NotForYou />;
}

function NumbersPage() {
  const [params, setParams] = useSearchParams();
  const ask = readPeriod(params, new Date());
  const numbers = useQuery(numbersQuery(ask.period));
  const download = useExportPayments();
  const { data } = numbers;
  return (
    <Page
      title="Numbers"
      lede={`From ${formatDay(ask.period.from)} to ${formatDay(ask.period.to)}.`}
      actions={
        <Button
          busy={download.isPending}
          onClick={() =>
            download.mutate(ask.period, { onError: (error) => void showProblem(sentenceOf(error)) })
          }
        >
          Payments as CSV
        </Button>
      }
    >
      <PeriodChoice
        ask={ask}
        onAsk={(name, period) => setParams(writePeriod(name, period), { replace: true })}
      />
      {numbers.isPending && <SkeletonRows rows={4} label="Loading the numbers" />}
      {numbers.isError && <Problem error={numbers.error} onRetry={() => numbers.refetch()} />}
      {data !== undefined &&
        (isEmpty(data) ? (
          <Empty
            title="Nothing was sent in this time"
            action={
              <LinkButton to={paths.board} kind="strong">
                Go to the board
              </LinkButton>
            }
          >
            Once proposals are sent, approved and paid, this tells how many, how fast and for how much.
          </Empty>
        ) : (
          <Figures numbers={data} stale={numbers.isPlaceholderData} />
        ))}
    </Page>
  );
}
