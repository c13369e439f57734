import type { Answer } from '../../lib/api/client';
import type { Stage } from '../../lib/stages';

export type Board = Answer<'/api/board', 'get'>;
export type Column = Board['columns'][number];
export type Card = Column['cards'][number];

export interface Moving {
  readonly jobId: string;
  readonly to: Stage;
}

/** The board with one job in another stage, on top of its column; itself where the job is not on it. */
export function moved(board: Board, { jobId, to }: Moving): Board {
  const from = board.columns.find((column) => column.cards.some((card) => card.jobId === jobId));
  const card = from?.cards.find((each) => each.jobId === jobId);
  if (from === undefined || card === undefined || from.stage === to) return board;
  return {
    ...board,
    columns: board.columns.map((column) => {
      if (column === from)
        return {
          ...column,
          count: column.count - 1,
          cards: column.cards.filter((each) => each !== card),
        };
      if (column.stage === to)
        return { ...column, count: column.count + 1, cards: [{ ...card, stage: to }, ...column.cards] };
      return column;
    }),
  };
}
