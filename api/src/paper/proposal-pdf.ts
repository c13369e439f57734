import { AppError } from '../http/app-error.js';
import type { RevisionDocument } from '../modules/proposals/revision-document.js';
import type { SignatureEvidence } from './signature.js';

export interface ProposalPaper {
  readonly document: RevisionDocument;
  /** SHA-256 of the document's canonical bytes, in hex. */
  readonly hash: string;
  /** The sheets' pictures (JPEG or PNG) by sheet id; a sheet may have none. */
  readonly pictures: ReadonlyMap<string, Buffer>;
  /** Null while nobody has signed. */
  readonly signature: SignatureEvidence | null;
}

/** The proposal as a PDF. The same input gives the same bytes. */
export async function proposalPdf(_paper: ProposalPaper): Promise<Buffer> {
  throw new AppError(501, 'not-built', 'The proposal can’t be put on paper yet.');
}
