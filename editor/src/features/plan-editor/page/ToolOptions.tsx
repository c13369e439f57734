import { recordsOf } from '@lampwright/geometry/plan';
import { Button } from '../../../components/button';
import { toSheet } from '../../../plan-view/camera';
import { CableEntry } from './CableEntry';
import { useDoc, useEditor, useSession, useTools } from './context';
import { SelectField } from './controls';
import { ItemPicker } from './ItemPicker';
import {
  type CatalogueEntry,
  fixtureChoice,
  lampsFor,
  pickItems,
  pickOf,
  transformerPicks,
  wattsOf,
} from './items';
import styles from './page.module.css';
import { AimOptions, FaceOptions, TreeOptions } from './UprightOptions';

/** What the tool at work puts down, and how to use it without a pointer. */
export function ToolOptions({ entries }: { readonly entries: readonly CatalogueEntry[] }) {
  const toolId = useTools((s) => s.toolId);
  switch (toolId) {
    case 'fixture':
      return (
        <Card>
          <FixtureOptions entries={entries} />
          <PlaceInMiddle />
        </Card>
      );
    case 'transformer':
      return (
        <Card>
          <TransformerOptions entries={entries} />
          <PlaceInMiddle />
        </Card>
      );
    case 'cable':
      return (
        <Card>
          <CableOptions entries={entries} />
          <CableEntry />
        </Card>
      );
    case 'hub':
      return (
        <Card>
          <HubOptions />
          <PlaceInMiddle />
        </Card>
      );
    case 'area':
      return (
        <Card>
          <p>
            Click the corners, or draw around it in one stroke. Enter or a double click closes it; Esc takes
            back a corner.
          </p>
        </Card>
      );
    case 'face':
      return (
        <Card>
          <FaceOptions />
        </Card>
      );
    case 'tree':
      return (
        <Card>
          <TreeOptions />
        </Card>
      );
    case 'aim':
      return (
        <Card>
          <AimOptions />
        </Card>
      );
    case 'measure':
      return (
        <Card>
          <p>Click from point to point. Enter or a double click ends; Esc takes back a point.</p>
        </Card>
      );
    case 'note':
      return (
        <Card>
          <p>Click where the note stands.</p>
          <PlaceInMiddle />
        </Card>
      );
    case 'select':
    case 'scale':
      return null;
  }
}

function Card({ children }: { readonly children: React.ReactNode }) {
  return <div className={styles.options}>{children}</div>;
}

function FixtureOptions({ entries }: { readonly entries: readonly CatalogueEntry[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const choices = useSession((s) => s.choices);
  const picks = pickItems(doc, entries, 'fixture');
  const lamps = pickItems(doc, entries, 'lamp');
  const chosen = pickOf(picks, choices.fixture?.item ?? null);
  const fitting = chosen === undefined ? [] : lampsFor(chosen.item, lamps);
  const lamp = pickOf(lamps, choices.fixture?.lamp ?? null);
  return (
    <>
      <ItemPicker
        label="Fixture"
        picks={picks}
        chosen={chosen}
        detail={(p) => (p.item.light === 'integrated' ? `${wattsOf(p.item)} W` : p.item.base)}
        onPick={(pick) =>
          editor.session.setState({ choices: { ...choices, fixture: fixtureChoice(pick, lamps) } })
        }
      />
      {chosen?.item.light === 'lamp' && (
        <SelectField
          label="Lamp"
          value={lamp?.key ?? ''}
          none="No lamp yet"
          options={fitting.map((l) => ({ value: l.key, label: l.item.name }))}
          onChange={(key) => {
            const pick = fitting.find((l) => l.key === key);
            if (choices.fixture !== null)
              editor.session.setState({
                choices: { ...choices, fixture: { ...choices.fixture, lamp: pick?.choice ?? null } },
              });
          }}
        />
      )}
    </>
  );
}

function TransformerOptions({ entries }: { readonly entries: readonly CatalogueEntry[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const choices = useSession((s) => s.choices);
  const sheetId = useSession((s) => s.sheetId);
  const picks = transformerPicks(doc, entries);
  const choice = choices.transformer;
  const elsewhere = [...recordsOf(doc, 'transformer')].filter((t) => t.sheetId !== sheetId);
  return (
    <>
      <ItemPicker
        label="Transformer"
        picks={picks}
        chosen={choice?.kind === 'new' ? pickOf(picks, choice.item) : undefined}
        detail={(p) => `${p.item.ratedVA} VA`}
        onPick={(pick) =>
          editor.session.setState({
            choices: { ...choices, transformer: { kind: 'new', item: pick.choice } },
          })
        }
      />
      {elsewhere.length > 0 && (
        <SelectField
          label="Or the feed of"
          value={choice?.kind === 'feed' ? choice.transformerId : ''}
          none="a new transformer"
          options={elsewhere.map((t) => ({ value: t.id, label: `T${t.number} ${t.name}`.trim() }))}
          onChange={(id) =>
            editor.session.setState({
              choices: {
                ...choices,
                transformer:
                  id !== ''
                    ? { kind: 'feed', transformerId: id }
                    : picks[0] === undefined
                      ? null
                      : { kind: 'new', item: picks[0].choice },
              },
            })
          }
        />
      )}
    </>
  );
}

function CableOptions({ entries }: { readonly entries: readonly CatalogueEntry[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const choices = useSession((s) => s.choices);
  const picks = pickItems(doc, entries, 'cable');
  return (
    <SelectField
      label="Cable"
      value={pickOf(picks, choices.cable)?.key ?? ''}
      options={picks.map((p) => ({ value: p.key, label: p.item.name }))}
      onChange={(key) => {
        const pick = picks.find((p) => p.key === key);
        if (pick !== undefined) editor.session.setState({ choices: { ...choices, cable: pick.choice } });
      }}
    />
  );
}

function HubOptions() {
  const editor = useEditor();
  const choices = useSession((s) => s.choices);
  return (
    <SelectField
      label="Place a"
      value={choices.junction}
      options={[
        { value: 'hub', label: 'Hub' },
        { value: 'splice', label: 'Splice' },
      ]}
      onChange={(value) =>
        editor.session.setState({ choices: { ...choices, junction: value === 'splice' ? 'splice' : 'hub' } })
      }
    />
  );
}

/** Placing without a pointer: in the middle of the view, from where arrow keys can move it. */
function PlaceInMiddle() {
  const editor = useEditor();
  return (
    <Button
      onClick={() => {
        const { camera, size } = editor.camera.state.getState();
        const at = toSheet(camera, { x: size.width / 2, y: size.height / 2 });
        const mods = { shift: false, alt: false };
        editor.tools.handle({ type: 'down', at, mods });
        editor.tools.handle({ type: 'up', at, mods });
        editor.tools.handle({ type: 'leave' });
      }}
    >
      Place in the middle of the view
    </Button>
  );
}
