import { recordOf } from '@lampwright/geometry/plan';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { type AskedQuestions, PanelFrame, type PlanEditor } from '../../features/plan-editor';
import { aboutOf, type Names } from '../../features/questions/about';
import { Threads } from '../../features/questions/threads';
import { openQuestions, type Question, questionsQuery } from '../../lib/affairs';
import type { Job } from '../../lib/jobs';
import { useAbilities } from '../../lib/me';
import { tagOf } from '../../plan-view/names';

/** Clients ask while the plan stands open. */
const REFRESH_MS = 30_000;

const namesOf = (editor: PlanEditor, job: Job): Names => ({
  light: (recordId) => {
    const fixture = recordOf(editor.doc, recordId, 'fixture');
    return fixture === undefined ? null : `Light ${tagOf(editor.doc, fixture)}`;
  },
  sheet: (sheetId) => job.sheets.find(({ id }) => id === sheetId)?.name ?? null,
});

function show(editor: PlanEditor, { recordId, sheetId, x, y }: Question): void {
  if (recordId !== null) editor.reveal(recordId);
  else if (sheetId !== null) {
    editor.openSheet(sheetId);
    if (x !== null && y !== null) editor.camera.reveal({ x, y });
  }
}

/** What the client asked about the plan, as pins on the drawing and a panel beside it. */
export function useQuestions(job: Job, editor: PlanEditor | null): AskedQuestions | null {
  const { sell } = useAbilities();
  const [chosenId, setChosenId] = useState<string | null>(null);
  const questions = useQuery({ ...questionsQuery(job.id), enabled: sell, refetchInterval: REFRESH_MS });
  const asked = questions.data ?? [];
  if (editor === null || asked.length === 0) return null;
  const names = namesOf(editor, job);
  const open = openQuestions(asked);
  return {
    open: open.length,
    pins: open.map((question) => ({
      id: question.id,
      label: `Question about ${aboutOf(question, names)}: ${question.messages[0]?.text ?? ''}`,
      recordId: question.recordId,
      sheetId: question.sheetId,
      x: question.x,
      y: question.y,
    })),
    onPin: (id) => {
      setChosenId(id);
      editor.session.setState({ panel: 'questions', drawer: 'none' });
    },
    panel: (
      <PanelFrame title="Questions">
        <Threads
          jobId={job.id}
          questions={asked}
          names={names}
          editable={job.archivedAt === null}
          onShow={(question) => {
            setChosenId(question.id);
            show(editor, question);
          }}
          chosenId={chosenId}
        />
      </PanelFrame>
    ),
  };
}
