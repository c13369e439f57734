import type { Group, JobPricing, Quote } from '@lampwright/geometry/price';
import { MAX_GROUPS } from '@lampwright/geometry/price';
import { useId, useState } from 'react';
import { Button } from '../../components/button';
import { Choice } from '../../components/form';
import { PlusIcon } from '../../components/icons';
import { Section } from '../../components/page';
import { Select } from '../../components/select';
import { Table } from '../../components/table';
import { count } from '../../lib/format';
import { type MoneyManner, moneyOf } from '../../lib/money';
import type { QuoteAnswer } from './api';
import { CommitField } from './commit-field';
import type { PlanFixture } from './fixtures-of';
import styles from './groups.module.css';
import { addGroup, assign, changeGroup, type Edit, removeGroup } from './store/edits';
import { kindLabel } from './words';

interface GroupsPartProps {
  readonly pricing: JobPricing;
  readonly quote: Quote;
  readonly checks: QuoteAnswer['checks'];
  readonly fixtures: readonly PlanFixture[];
  readonly editable: boolean;
  readonly manner: MoneyManner;
  readonly edit: (label: string, edit: Edit) => void;
  /** Does an edit that is easily regretted, and offers to undo it. */
  readonly editWithUndo: (label: string, told: string, edit: Edit) => void;
}

/** Stages and additions: lights that the homeowner may take or leave together. */
export function GroupsPart(props: GroupsPartProps) {
  const { pricing, editable, edit } = props;
  const full = pricing.groups.length >= MAX_GROUPS;
  const add = () =>
    edit(
      'Add a group',
      addGroup({ id: crypto.randomUUID(), name: nextName(pricing.groups), description: '', on: true }),
    );
  return (
    <>
      <Section
        title="Groups"
        lede="Lights that the homeowner takes or leaves together. What is in no group is in the base, which is always in; cable that several groups need is, too."
        actions={
          editable && (
            <Button onClick={add} disabled={full}>
              <PlusIcon />
              Add a group
            </Button>
          )
        }
      >
        {full && editable && (
          <p className={styles.note}>
            {MAX_GROUPS} groups are the most: every combination of them is checked on the plan.
          </p>
        )}
        {pricing.groups.length === 0 && (
          <p className={styles.note}>
            There is one price for everything so far.
            {editable && ' Add a group for a later stage, or for lights to offer on top.'}
          </p>
        )}
        <ul className={styles.cards}>
          {pricing.groups.map((group) => (
            <GroupCard key={group.id} group={group} {...props} />
          ))}
        </ul>
      </Section>
      <Combinations {...props} />
      {pricing.groups.length > 0 && <Lights {...props} />}
    </>
  );
}

function nextName(groups: readonly Group[]): string {
  const taken = new Set(groups.map(({ name }) => name));
  for (let n = 1; ; n++) if (!taken.has(`Stage ${n}`)) return `Stage ${n}`;
}

function GroupCard({
  group,
  quote,
  editable,
  manner,
  edit,
  editWithUndo,
}: GroupsPartProps & { readonly group: Group }) {
  const quoted = quote.groups.find(({ id }) => id === group.id);
  return (
    <li className={styles.card}>
      <div className={styles.cardFields}>
        <CommitField
          label="Name"
          value={group.name}
          maxLength={60}
          disabled={!editable}
          onCommit={(text) => {
            const name = text.trim();
            if (name === '') return 'Please give the group a name.';
            edit('Rename the group', changeGroup(group.id, { name }));
            return null;
          }}
        />
        <CommitField
          label="For the homeowner"
          rows={2}
          value={group.description}
          maxLength={400}
          placeholder="What these lights do for the garden, in a sentence or two"
          disabled={!editable}
          onCommit={(text) => {
            edit('Describe the group', changeGroup(group.id, { description: text.trim() }));
            return null;
          }}
        />
      </div>
      <div className={styles.cardSide}>
        <Choice
          label="In the proposal"
          value={group.on ? 'on' : 'off'}
          disabled={!editable}
          options={[
            { value: 'on', label: 'Taken' },
            { value: 'off', label: 'Offered' },
          ]}
          onChange={(value) => edit('Take or offer the group', changeGroup(group.id, { on: value === 'on' }))}
        />
        <p className={styles.cardSum}>
          <span>{count(quoted?.fixtures ?? 0, 'light')}</span>
          <strong>{quoted ? moneyOf(manner)(quoted.priceMinor) : '–'}</strong>
        </p>
        {editable && (
          <Button
            kind="bare"
            aria-label={`Remove ${group.name}`}
            onClick={() =>
              editWithUndo(
                'Remove the group',
                `${group.name} is removed; its lights are in the base.`,
                removeGroup(group.id),
              )
            }
          >
            Remove
          </Button>
        )}
      </div>
    </li>
  );
}

/** The choices that a homeowner can't be given, and why. */
function Combinations({ checks, pricing }: GroupsPartProps) {
  const bad = checks.filter(({ offerable }) => !offerable);
  if (bad.length === 0) return null;
  const nameOf = (id: string) => pricing.groups.find((group) => group.id === id)?.name;
  const words = (groups: readonly string[]) => {
    const names = groups.map(nameOf).filter((name) => name !== undefined);
    return names.length === 0 ? 'The base alone' : `The base with ${new Intl.ListFormat('en').format(names)}`;
  };
  return (
    <Section
      title="What can’t be offered"
      lede={
        checks.length > 1
          ? `${bad.length} of ${count(checks.length, 'combination')} would have faults once built. The homeowner can’t choose them.`
          : undefined
      }
    >
      <ul className={styles.bad}>
        {bad.map(({ groups, faults }) => (
          <li key={groups.join(' ')}>
            <strong>{words(groups)}</strong>
            <ul>
              {faults.map((fault) => (
                <li key={fault}>{fault}</li>
              ))}
            </ul>
          </li>
        ))}
      </ul>
    </Section>
  );
}

/** Which light is in which group; many at once by run or kind. */
function Lights({ pricing, fixtures, editable, edit }: GroupsPartProps) {
  const groupOf = (id: string) => pricing.members[id] ?? '';
  const options = (
    <>
      <option value="">Base</option>
      {pricing.groups.map(({ id, name }) => (
        <option key={id} value={id}>
          {name}
        </option>
      ))}
    </>
  );
  return (
    <Section title="Lights in groups">
      {fixtures.length === 0 ? (
        <p className={styles.note}>There are no lights on the plan yet.</p>
      ) : (
        <>
          {editable && <ManyAtOnce fixtures={fixtures} groups={pricing.groups} edit={edit} />}
          <Table label="Lights and their groups">
            <thead>
              <tr>
                <th scope="col">Light</th>
                <th scope="col" className={styles.wide}>
                  Run
                </th>
                <th scope="col">Group</th>
              </tr>
            </thead>
            <tbody>
              {fixtures.map(({ id, tag, name, quantity, run }) => (
                <tr key={id} className={styles.light}>
                  <td>
                    <strong>{tag}</strong> {name}
                    {quantity > 1 && ` × ${quantity}`}
                    <span className={styles.narrow}>{run?.label ?? 'not wired yet'}</span>
                  </td>
                  <td className={styles.wide}>
                    {run?.label ?? <span className="quiet">not wired yet</span>}
                  </td>
                  <td>
                    <Select
                      aria-label={`Group of ${tag}`}
                      value={groupOf(id)}
                      disabled={!editable}
                      onChange={(event) =>
                        edit(
                          `Move ${tag}`,
                          assign([id], event.target.value === '' ? null : event.target.value),
                        )
                      }
                    >
                      {options}
                    </Select>
                  </td>
                </tr>
              ))}
            </tbody>
          </Table>
        </>
      )}
    </Section>
  );
}

interface ManyProps {
  readonly fixtures: readonly PlanFixture[];
  readonly groups: readonly Group[];
  readonly edit: GroupsPartProps['edit'];
}

interface Choosable {
  readonly value: string;
  readonly label: string;
  readonly ids: readonly string[];
}

/** Sets of lights that are put somewhere together: all, those of a run, those of a kind. */
export function setsOf(fixtures: readonly PlanFixture[]): {
  readonly runs: readonly Choosable[];
  readonly kinds: readonly Choosable[];
} {
  const gather = (entry: (f: PlanFixture) => { value: string; label: string } | null) => {
    const sets = new Map<string, { value: string; label: string; ids: string[] }>();
    for (const fixture of fixtures) {
      const of = entry(fixture);
      if (of === null) continue;
      const set = sets.get(of.value) ?? { ...of, ids: [] };
      set.ids.push(fixture.id);
      sets.set(of.value, set);
    }
    return [...sets.values()].sort((a, b) => a.label.localeCompare(b.label, undefined, { numeric: true }));
  };
  return {
    runs: gather(({ run }) => run && { value: `run ${run.id}`, label: run.label }),
    kinds: gather(({ kind }) => kind && { value: `kind ${kind}`, label: kindLabel(kind) }),
  };
}

function ManyAtOnce({ fixtures, groups, edit }: ManyProps) {
  const { runs, kinds } = setsOf(fixtures);
  const id = useId();
  const [what, setWhat] = useState('all');
  const [where, setWhere] = useState(groups[0]?.id ?? '');
  const set = [...runs, ...kinds].find(({ value }) => value === what);
  const ids = set?.ids ?? fixtures.map(({ id }) => id);
  const target = groups.some(({ id }) => id === where) ? where : '';
  return (
    <div className={styles.many}>
      <span className={styles.manyPart}>
        <label htmlFor={`${id}-what`}>Put</label>
        <Select
          id={`${id}-what`}
          value={set ? what : 'all'}
          onChange={(event) => setWhat(event.target.value)}
        >
          <option value="all">all lights</option>
          <optgroup label="Of a run">
            {runs.map(({ value, label, ids }) => (
              <option key={value} value={value}>
                {`${label} (${ids.length})`}
              </option>
            ))}
          </optgroup>
          <optgroup label="Of a kind">
            {kinds.map(({ value, label, ids }) => (
              <option key={value} value={value}>
                {`${label} (${ids.length})`}
              </option>
            ))}
          </optgroup>
        </Select>
      </span>
      <span className={styles.manyPart}>
        <label htmlFor={`${id}-where`}>into</label>
        <Select id={`${id}-where`} value={target} onChange={(event) => setWhere(event.target.value)}>
          <option value="">Base</option>
          {groups.map(({ id, name }) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </Select>
      </span>
      <Button
        onClick={() => edit(`Move ${count(ids.length, 'light')}`, assign(ids, target === '' ? null : target))}
      >
        Put {count(ids.length, 'light')} there
      </Button>
    </div>
  );
}
