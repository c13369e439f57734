import { Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { AppError } from '../../http/app-error.js';
import type { Board, Numbers, NumbersQuery, Timeline } from './timeline.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class TimelineService {
  async ofJob(_actor: Actor, _jobId: string): Promise<Timeline> {
    throw notBuilt();
  }

  async board(_actor: Actor): Promise<Board> {
    throw notBuilt();
  }

  async numbers(_actor: Actor, _query: NumbersQuery): Promise<Numbers> {
    throw notBuilt();
  }
}
