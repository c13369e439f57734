import { LIGHT_PICTURE } from '../proposals/pictures.js';

/** Where a guest finds the files of their page. */
const base = (linkId: string) => `/api/share/${linkId}`;

export const pictureUrl = (linkId: string, sheetId: string): string =>
  `${base(linkId)}/pictures/${encodeURIComponent(sheetId)}`;

/** Narrow screens: what they show of a picture is hardly wider than the light one, however dense they are. */
export const LIGHT_PICTURE_MEDIA = '(max-width: 719px)';

export const lightPictureUrl = (linkId: string, sheetId: string): string =>
  `${pictureUrl(linkId, sheetId)}?width=${LIGHT_PICTURE.edgePx}`;

export const paperUrl = (linkId: string, paperId: string): string =>
  `${base(linkId)}/papers/${encodeURIComponent(paperId)}`;

/**
 * Where whoever went to the card service comes back to. It holds no token: in their browser the link's cookie lets
 * them in, and for everybody else it opens nothing.
 */
export const backUrl = (publicUrl: string, linkId: string): string =>
  new URL(`/p/back/${linkId}`, publicUrl).href;

/** Where the company finds the proposal of a job. */
export const jobProposalUrl = (publicUrl: string, jobId: string): string =>
  new URL(`/jobs/${jobId}/proposal`, publicUrl).href;
