import { Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import { AppError } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import type { NewMessage, Question } from '../proposals/proposals.dto.js';
import type { GuestCaller } from './guest-caller.js';
import type { Approve, Ask, Checkout, Decline, SharedPage } from './share.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class ShareService {
  async page(_guest: Guest, _linkId: string): Promise<SharedPage> {
    throw notBuilt();
  }

  async opened(_guest: Guest, _linkId: string): Promise<void> {
    throw notBuilt();
  }

  async picture(_guest: Guest, _linkId: string, _sheetId: string): Promise<StoredFile> {
    throw notBuilt();
  }

  async paper(_guest: Guest, _linkId: string, _paperId: string): Promise<StoredFile> {
    throw notBuilt();
  }

  async ask(_guest: Guest, _linkId: string, _input: Ask): Promise<Question> {
    throw notBuilt();
  }

  async reply(_guest: Guest, _linkId: string, _questionId: string, _input: NewMessage): Promise<Question> {
    throw notBuilt();
  }

  async approve(_guest: Guest, _linkId: string, _input: Approve, _caller: GuestCaller): Promise<SharedPage> {
    throw notBuilt();
  }

  async decline(_guest: Guest, _linkId: string, _input: Decline): Promise<SharedPage> {
    throw notBuilt();
  }

  async checkout(_guest: Guest, _linkId: string, _dueId: string): Promise<Checkout> {
    throw notBuilt();
  }
}
