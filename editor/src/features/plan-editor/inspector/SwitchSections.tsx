import { controlZonesOf } from '@lampwright/geometry/light';
import { scheduleInWords } from '@lampwright/geometry/night';
import {
  addZone,
  type PlanDocument,
  putRecords,
  type RunRecord,
  recordOf,
  recordsOf,
  type Schedule,
  setFields,
  settingsOf,
  type TransformerRecord,
  type ZoneRecord,
} from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { Button } from '../../../components/button';
import { OwnScheduleControl, ScheduleControl } from '../../../components/schedule-field';
import { tagOf } from '../../../plan-view/names';
import { useDoc, useEditor } from '../page/context';
import { CommitField } from '../page/controls';
import styles from './inspector.module.css';
import { common, idsOf } from './shared';
import switching from './switching.module.css';
import { nextZoneName } from './ZoneFields';

/** The schedule that all have, as one value to compare; undefined where they differ. */
function commonSchedule(
  records: readonly { readonly schedule: Schedule | null }[],
): Schedule | null | undefined {
  const text = common(records, (r) => JSON.stringify(r.schedule));
  return text === undefined ? undefined : (records[0]?.schedule ?? null);
}

/** When a transformer’s control switches it. */
export function TransformerTimes({ transformers }: { readonly transformers: readonly TransformerRecord[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const schedule = commonSchedule(transformers);
  return (
    <OwnScheduleControl
      label={schedule === undefined ? 'On (several)' : 'On'}
      value={schedule ?? null}
      usual={settingsOf(doc).schedule}
      usualLabel="As the plan says"
      disabled={!editor.canEdit}
      commit={(next) =>
        editor.edit('Change times', (d) =>
          setFields(d, idsOf(transformers), 'transformer', { schedule: next }),
        )
      }
    />
  );
}

/** Whether a run has a switch of its own on its home run, and when that is on. */
export function RunSwitch({ run }: { readonly run: RunRecord }) {
  const editor = useEditor();
  const doc = useDoc();
  const transformer = recordOf(doc, run.transformerId, 'transformer');
  return (
    <OwnScheduleControl
      label="Switch"
      value={run.schedule}
      usual={transformer?.schedule ?? settingsOf(doc).schedule}
      usualLabel={transformer === undefined ? 'With its transformer' : `With ${tagOf(doc, transformer)}`}
      hint="A switch of its own sits on its home run: then its lights are a zone by themselves."
      disabled={!editor.canEdit}
      commit={(schedule) =>
        editor.edit(schedule === null ? 'Take out switch' : 'Change switch', (d) =>
          setFields(d, [run.id], 'run', { schedule }),
        )
      }
    />
  );
}

/** When the plan's lights are on, what of them can be switched apart, and the zones of smart lights. */
export function TimesSection() {
  const editor = useEditor();
  const doc = useDoc();
  const { together } = useMemo(() => controlZonesOf(doc), [doc]);
  const zones = [...recordsOf(doc, 'zone')];
  return (
    <>
      <h2>Times and zones</h2>
      <ScheduleControl
        label="The plan’s lights are on"
        hint="Transformers and runs may have times of their own."
        value={settingsOf(doc).schedule}
        disabled={!editor.canEdit}
        commit={(schedule) =>
          editor.edit('Change times', (d) => putRecords(d, [{ ...settingsOf(d), schedule }]))
        }
      />
      {together.length > 0 && (
        <ul className={switching.sentences} aria-label="What can be switched apart">
          {together.map((sentence) => (
            <li key={sentence}>{sentence}</li>
          ))}
        </ul>
      )}
      {zones.length > 0 && (
        <ul className={switching.zones} aria-label="Zones of smart lights">
          {zones.map((zone) => (
            <li key={zone.id}>
              <Button kind="bare" onClick={() => editor.reveal(zone.id)}>
                {zone.name}
              </Button>
              <span>
                {scheduleInWords(zone.schedule)}, {lightsText(membersOf(doc, zone.id).length)}
              </span>
            </li>
          ))}
        </ul>
      )}
      {editor.canEdit && (
        <div className={styles.actions}>
          <Button
            onClick={() =>
              editor.edit(
                'Make zone',
                (d) => addZone(d, { name: nextZoneName(d), schedule: settingsOf(d).schedule }, []),
                false,
              )
            }
          >
            Add a zone of smart lights
          </Button>
        </div>
      )}
    </>
  );
}

export function ZoneSection({ zone }: { readonly zone: ZoneRecord }) {
  const editor = useEditor();
  const doc = useDoc();
  const locked = !editor.canEdit;
  const members = membersOf(doc, zone.id);
  return (
    <>
      <h2>{zone.name}</h2>
      <p className={styles.facts}>
        {members.length === 0
          ? 'No light is in it yet: choose smart lights and put them in.'
          : `${lightsText(members.length)}: ${members.map((f) => tagOf(doc, f)).join(', ')}.`}
      </p>
      <CommitField
        label="Name"
        inputId="inspector-name"
        value={zone.name}
        maxLength={120}
        disabled={locked}
        commit={(name) => {
          if (name.trim() === '') return 'Give the zone a name.';
          editor.edit('Rename zone', (d) => setFields(d, [zone.id], 'zone', { name: name.trim() }));
          return null;
        }}
      />
      <ScheduleControl
        label="On"
        value={zone.schedule}
        disabled={locked}
        commit={(schedule) =>
          editor.edit('Change times', (d) => setFields(d, [zone.id], 'zone', { schedule }))
        }
      />
      {members.length > 0 && (
        <div className={styles.actions}>
          <Button onClick={() => editor.select(idsOf(members))}>Choose its lights</Button>
        </div>
      )}
    </>
  );
}

function membersOf(doc: PlanDocument, zoneId: string) {
  return [...recordsOf(doc, 'fixture')].filter((f) => f.zoneId === zoneId);
}

const lightsText = (count: number): string => (count === 1 ? '1 light' : `${count} lights`);
