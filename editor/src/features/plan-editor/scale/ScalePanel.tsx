import { scaleOfSheet } from '@lampwright/geometry/estimate';
import { type SheetRecord, setFields } from '@lampwright/geometry/plan';
import { TRUSTED_RELATIVE_ERROR } from '@lampwright/geometry/sheet';
import { formatRatio, parseDrawingScale } from '@lampwright/geometry/units';
import { Button } from '../../../components/button';
import { useEditor, useSession, useSheet, useUnitSystem } from '../page/context';
import { CommitField } from '../page/controls';
import { plainLength } from '../page/lengths';
import { PanelFrame } from '../page/PanelFrame';
import { fitOf, horizonText } from './fit';
import styles from './scale.module.css';

/** How long this sheet's pixels are: what is known, how well it fits together, and ways to say more. */
export function ScalePanel() {
  const editor = useEditor();
  const sheet = useSheet();
  if (sheet === undefined) return null;
  return (
    <PanelFrame
      title={`Scale of ${sheet.name || 'this sheet'}`}
      side="start"
      onClose={() => editor.use('select')}
    >
      <Verdict sheet={sheet} />
      {sheet.view === 'photo' ? <PhotoWays /> : <PlanWays sheet={sheet} />}
      <References sheet={sheet} />
    </PanelFrame>
  );
}

function Verdict({ sheet }: { readonly sheet: SheetRecord }) {
  const system = useUnitSystem();
  const result = scaleOfSheet(sheet);
  if (!result.ok) {
    const untouched = sheet.references.length === 0 && sheet.groundMetersPerPaperMeter === null;
    return (
      <p role="status">
        {untouched ? 'No scale yet. You can draw already; lengths and volts wait for it.' : result.message}
      </p>
    );
  }
  const { scale } = result;
  return (
    <div role="status" className={styles.verdict}>
      <p>
        <strong>{fitOf(scale)}</strong>
      </p>
      <p>{horizonText(scale, { width: sheet.widthPx, height: sheet.heightPx }, system)}</p>
      <p className={styles.quiet}>
        Each length shows its expected error, for clicks good to one pixel of the sheet. Where that passes{' '}
        {TRUSTED_RELATIVE_ERROR * 100} %, or near the horizon, the plan says that it can’t be trusted.
      </p>
    </div>
  );
}

function PhotoWays() {
  const editor = useEditor();
  const reference = useSession((s) => s.choices.reference);
  const choose = (next: 'length' | 'rectangle') => {
    editor.session.setState({ choices: { ...editor.session.getState().choices, reference: next } });
  };
  if (!editor.canEdit) return null;
  return (
    <div className={styles.ways}>
      <fieldset className={styles.pair} aria-label="What to click">
        <Button
          aria-pressed={reference === 'rectangle'}
          kind={reference === 'rectangle' ? 'strong' : 'quiet'}
          onClick={() => choose('rectangle')}
        >
          Known rectangle
        </Button>
        <Button
          aria-pressed={reference === 'length'}
          kind={reference === 'length' ? 'strong' : 'quiet'}
          onClick={() => choose('length')}
        >
          Known length
        </Button>
      </fieldset>
      <p>
        {reference === 'rectangle'
          ? 'Click the four corners of something square on the ground, in order around it: a patio, a slab, a pond. Then type its two sides.'
          : 'Click both ends of something on the ground whose length you know. A photo needs one rectangle first; lengths tighten it.'}
      </p>
    </div>
  );
}

function PlanWays({ sheet }: { readonly sheet: SheetRecord }) {
  const editor = useEditor();
  const known = sheet.groundMetersPerPaperMeter;
  return (
    <div className={styles.ways}>
      {sheet.pixelsPerPaperMeter !== null && (
        <CommitField
          label="Drawing scale"
          value={known === null ? '' : formatRatio(known)}
          placeholder="1 in = 10 ft"
          disabled={!editor.canEdit}
          hint="As written on the drawing: 1 in = 10 ft, 1/4″ = 1′ or 1:100."
          commit={(text) => {
            if (text.trim() === '') {
              editor.edit('Set scale', (d) =>
                setFields(d, [sheet.id], 'sheet', { groundMetersPerPaperMeter: null }),
              );
              return null;
            }
            const parsed = parseDrawingScale(text);
            if (!parsed.ok) return parsed.message;
            editor.edit('Set scale', (d) =>
              setFields(d, [sheet.id], 'sheet', {
                groundMetersPerPaperMeter: parsed.groundMetersPerPaperMeter,
              }),
            );
            return null;
          }}
        />
      )}
      {editor.canEdit && (
        <p>
          {sheet.pixelsPerPaperMeter !== null ? 'Or click' : 'Click'} both ends of something whose length you
          know, then type it. The longer the better; several are averaged.
        </p>
      )}
    </div>
  );
}

function References({ sheet }: { readonly sheet: SheetRecord }) {
  const editor = useEditor();
  const system = useUnitSystem();
  const result = scaleOfSheet(sheet);
  const residuals = result.ok ? result.scale.residuals : [];
  if (sheet.references.length === 0) return null;
  return (
    <div>
      <h3>References</h3>
      <ul className={styles.references}>
        {sheet.references.map((reference, i) => {
          const own = residuals.filter((r) => r.referenceId === reference.id);
          const worst = own.reduce<(typeof own)[number] | null>(
            (w, r) => (w === null || Math.abs(r.relative) > Math.abs(w.relative) ? r : w),
            null,
          );
          const what =
            reference.kind === 'length'
              ? plainLength(reference.meters, system)
              : `${plainLength(reference.widthMeters, system)} by ${plainLength(reference.depthMeters, system)}`;
          return (
            <li key={reference.id}>
              <span>
                {i + 1}. {reference.kind === 'length' ? 'Length' : 'Rectangle'} {what}
                {worst !== null && (
                  <span className={styles.quiet}>
                    {' '}
                    · off by {plainLength(Math.abs(worst.gotMeters - worst.expectedMeters), system)} (
                    {(Math.abs(worst.relative) * 100).toFixed(1)} %)
                  </span>
                )}
              </span>
              {editor.canEdit && (
                <Button
                  kind="bare"
                  aria-label={`Remove reference ${i + 1}`}
                  onClick={() =>
                    editor.edit('Remove reference', (d) =>
                      setFields(d, [sheet.id], 'sheet', {
                        references: sheet.references.filter((r) => r.id !== reference.id),
                      }),
                    )
                  }
                >
                  Remove
                </Button>
              )}
            </li>
          );
        })}
      </ul>
    </div>
  );
}
