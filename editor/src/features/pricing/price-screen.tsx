import { type ManualLine, type QuoteWarning, scheduleOf } from '@lampwright/geometry/price';
import { useQuery } from '@tanstack/react-query';
import { type ReactNode, useEffect, useMemo, useState } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import { Button, LinkButton } from '../../components/button';
import { PlusIcon } from '../../components/icons';
import { Page } from '../../components/page';
import { Empty, Problem, SkeletonRows } from '../../components/states';
import { showToast } from '../../components/toast';
import { type CatalogueEntry, catalogueQuery, type Obstacle, planQuery } from './api';
import { arrange, groupsWithEdits, linesWithEdits } from './arrange';
import { ClashPanel } from './clash-panel';
import type { ClashNames } from './clash-words';
import { FaultsPart } from './faults-part';
import { fixturesOf, transformersOf } from './fixtures-of';
import { GroupsPart } from './groups-part';
import { ItemPriceDialog, type ItemToPrice } from './item-price-dialog';
import { LineTable } from './line-table';
import { ManualLineDialog, newManualLine } from './manual-line';
import { SaveNote } from './save-note';
import { SchedulePart } from './schedule-part';
import styles from './screen.module.css';
import { type Edit, override, putManualLine, removeManualLine } from './store/edits';
import type { Owner } from './store/kept';
import { SumPanel } from './sum-panel';
import { TermsPart } from './terms-part';
import { useJobPricing, usePricing, useQuote } from './use-job-pricing';

const parts = ['lines', 'groups', 'terms', 'faults', 'schedule'] as const;
type Part = (typeof parts)[number];

export interface PriceScreenProps {
  readonly owner: Owner;
  readonly jobName: string;
  readonly jobTo: string;
  readonly proposalTo: string;
  readonly priceBookTo: string | null;
  readonly planHref: (recordIds: readonly string[]) => string;
  /** False where the job is archived. */
  readonly editable: boolean;
}

/** Materials and price of a job: where the designer is between the plan and the proposal. */
export function PriceScreen(props: PriceScreenProps) {
  const { owner, jobName, jobTo, planHref, editable } = props;
  const { jobId } = owner;
  const store = useJobPricing(owner);
  const state = usePricing(store);
  const quote = useQuote(jobId, store);
  const plan = useQuery(planQuery(jobId));
  const catalogue = useQuery(catalogueQuery);
  const [search] = useSearchParams();
  const part = parts.find((one) => one === search.get('part')) ?? 'lines';
  const [pricing, setPricing] = useState<ItemToPrice | null>(null);
  const [writing, setWriting] = useState<{ line: ManualLine; isNew: boolean } | null>(null);
  const doc = plan.data?.doc;
  const fixtures = useMemo(() => (doc ? fixturesOf(doc) : []), [doc]);
  const transformers = useMemo(() => (doc ? transformersOf(doc) : []), [doc]);
  const schedule = useMemo(() => (doc ? scheduleOf(doc) : []), [doc]);
  const slow = useSlow(quote.isFetching);

  useEffect(() => {
    for (const message of state.notes) showToast({ message });
    if (state.notes.length > 0) store.forgetNotes();
  }, [store, state.notes]);

  const frame = (children: ReactNode) => (
    <Page title="Materials and price" tabTitle={`Price of ${jobName}`} back={{ to: jobTo, label: jobName }}>
      {children}
    </Page>
  );
  const failed = [quote, plan, catalogue].find((query) => query.isError && query.data === undefined);
  if (failed) return frame(<Problem error={failed.error} onRetry={() => void failed.refetch()} />);
  if (state.phase === 'failed')
    return frame(<Problem error={state.failure} onRetry={() => void store.start()} />);
  if (state.phase === 'loading' || !quote.data || !doc || !catalogue.data)
    return frame(<SkeletonRows rows={8} label="Loading the price" />);

  const answer = quote.data;
  const manner = { currency: answer.quote.currency, locale: answer.quote.locale };
  const edit = (label: string, change: Edit) => store.edit(label, change);
  const editWithUndo = (label: string, told: string, change: Edit) => {
    store.edit(label, change);
    showToast({ message: told, undo: () => store.undo() });
  };
  const shown = linesWithEdits(answer.quote.lines, state.pricing);
  const groups = groupsWithEdits(answer.quote, state.pricing);
  const stuck = state.save.is !== 'saved' && state.save.is !== 'saving';
  const ahead = !stuck && (state.unsent > 0 || answer.pricingVersion !== state.base.version || slow);
  const openFaults = answer.faults.filter(({ acceptance }) => acceptance === null).length;
  const mendHref = ({ mend }: Obstacle): string => (mend === 'plan' ? planHref([]) : `?part=${mend}`);
  const names: ClashNames = {
    line: (key) => shown.find((line) => line.key === key)?.name ?? 'A line that is no longer on the plan',
    record: (id) =>
      fixtures.find((fixture) => fixture.id === id)?.tag ??
      transformers.find((transformer) => transformer.id === id)?.label ??
      'something that is no longer on the plan',
    item: (id) => nameOfItem(catalogue.data, id),
    tax: (id) => answer.terms.taxes.find((tax) => tax.id === id)?.name ?? 'a tax that is gone',
  };
  const hold =
    state.clash !== null
      ? 'Once you have chosen between your change and somebody else’s.'
      : state.unsent > 0
        ? 'Once your last changes are saved.'
        : editable
          ? null
          : 'The job is archived.';

  return (
    <Page
      title="Materials and price"
      tabTitle={`Price of ${jobName}`}
      back={{ to: jobTo, label: jobName }}
      actions={editable && <SaveNote store={store} state={state} />}
    >
      <div className={styles.screen}>
        <div className={styles.main}>
          <nav className={styles.tabs} aria-label="Parts of the price">
            {parts.map((one) => (
              <Link
                key={one}
                to={one === 'lines' ? '?' : `?part=${one}`}
                replace
                className={styles.tab}
                aria-current={one === part ? 'page' : undefined}
              >
                {partLabel(one)}
                {one === 'faults' && openFaults > 0 && <span className={styles.many}>{openFaults}</span>}
              </Link>
            ))}
          </nav>
          {slow && <div className={styles.progress} role="status" aria-label="Working out the price" />}
          {quote.isError && <Problem error={quote.error} onRetry={() => void quote.refetch()} />}
          {state.save.is === 'refused' && <Problem error={state.save.message} />}
          <ClashPanel store={store} state={state} names={names} manner={manner} />
          {part === 'lines' && (
            <>
              <Warnings warnings={answer.quote.warnings} lines={shown.map(({ key }) => key)} {...props} />
              {fixtures.length === 0 && (
                <Empty
                  title="Nothing is on the plan yet"
                  action={<LinkButton to={planHref([])}>Open the plan</LinkButton>}
                >
                  Lines come from what is on the plan: fixtures, lamps, cable, transformers, and the work on
                  them.
                </Empty>
              )}
              {shown.length > 0 && (
                <LineTable
                  groups={arrange(groups, shown)}
                  manner={manner}
                  seesCosts={answer.seesCosts}
                  editable={editable}
                  warnings={answer.quote.warnings}
                  manualLines={state.pricing.manualLines}
                  overrides={state.pricing.overrides}
                  planHref={planHref}
                  onOverride={({ key, name }, value) =>
                    value === null
                      ? editWithUndo(
                          'Back to the plan’s',
                          `${name} is as the plan says.`,
                          override(key, null),
                        )
                      : edit(`Change ${name}`, override(key, value))
                  }
                  onEditManual={(line) => setWriting({ line, isNew: false })}
                  onRemoveManual={(line) =>
                    editWithUndo('Remove a line', `${line.name} is removed.`, removeManualLine(line.id))
                  }
                  onPriceItem={(itemId, name) => setPricing({ itemId, name })}
                />
              )}
              {editable && (
                <p className={styles.foot}>
                  <Button onClick={() => setWriting({ line: newManualLine(), isNew: true })}>
                    <PlusIcon />
                    Add a line by hand
                  </Button>
                </p>
              )}
            </>
          )}
          {part === 'groups' && (
            <GroupsPart
              pricing={state.pricing}
              quote={answer.quote}
              checks={answer.checks}
              fixtures={fixtures}
              editable={editable}
              manner={manner}
              edit={edit}
              editWithUndo={editWithUndo}
            />
          )}
          {part === 'terms' && (
            <TermsPart
              pricing={state.pricing}
              usual={answer.terms}
              catalogue={catalogue.data}
              transformers={transformers}
              stages={answer.quote.combinations[0]?.stages ?? []}
              editable={editable}
              manner={manner}
              edit={edit}
            />
          )}
          {part === 'faults' && (
            <FaultsPart jobId={jobId} faults={answer.faults} editable={editable} planHref={planHref} />
          )}
          {part === 'schedule' && <SchedulePart rows={schedule} planHref={planHref} />}
        </div>
        <SumPanel
          quote={answer.quote}
          seesCosts={answer.seesCosts}
          obstacles={answer.obstacles}
          mendHref={mendHref}
          proposalTo={props.proposalTo}
          ahead={ahead}
          behind={stuck}
          hold={hold}
        />
      </div>
      <ItemPriceDialog item={pricing} onClose={() => setPricing(null)} />
      <ManualLineDialog
        line={writing?.line ?? null}
        isNew={writing?.isNew ?? true}
        groups={state.pricing.groups}
        manner={manner}
        seesCosts={answer.seesCosts}
        onSave={(line) => edit(writing?.isNew ? 'Add a line' : `Change ${line.name}`, putManualLine(line))}
        onClose={() => setWriting(null)}
      />
    </Page>
  );
}

function partLabel(part: Part): string {
  switch (part) {
    case 'lines':
      return 'Lines';
    case 'groups':
      return 'Stages and additions';
    case 'terms':
      return 'Terms';
    case 'faults':
      return 'Faults';
    case 'schedule':
      return 'Schedule';
  }
}

const nameOfItem = (catalogue: readonly CatalogueEntry[], id: string): string =>
  catalogue.find((entry) => entry.id === id)?.item.name ?? 'an item that is gone';

/** True once something has been going on for half a second: quicker than that shows nothing. */
function useSlow(busy: boolean): boolean {
  const [slow, setSlow] = useState(false);
  useEffect(() => {
    if (!busy) return setSlow(false);
    const timer = setTimeout(() => setSlow(true), 500);
    return () => clearTimeout(timer);
  }, [busy]);
  return slow;
}

interface WarningsProps extends Pick<PriceScreenProps, 'planHref' | 'priceBookTo'> {
  readonly warnings: readonly QuoteWarning[];
  /** Keys of lines that are shown: what is about one of them stands there. */
  readonly lines: readonly string[];
}

/** What the price as a whole needs looked at. */
function Warnings({ warnings, lines, planHref, priceBookTo }: WarningsProps) {
  const own = warnings.filter(({ lineKey }) => lineKey === null || !lines.includes(lineKey));
  if (own.length === 0) return null;
  return (
    <ul className={styles.warnings} aria-label="To look at">
      {own.map(({ code, message, lineKey, recordIds }) => (
        <li key={`${code} ${lineKey} ${message}`}>
          {message} {recordIds.length > 0 && <Link to={planHref(recordIds)}>Show on the plan</Link>}
          {code === 'no-tax' && <Link to="?part=terms">Choose</Link>}
          {code === 'no-tax' && priceBookTo !== null && (
            <>
              {' or '}
              <Link to={priceBookTo}>set one in the price book</Link>
            </>
          )}
          {code === 'empty-group' && <Link to="?part=groups">Fill it</Link>}
          {code === 'no-control' && <Link to="?part=terms">Choose one</Link>}
        </li>
      ))}
    </ul>
  );
}
