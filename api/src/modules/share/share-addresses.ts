/** Where a guest finds the files of their page. */
const base = (linkId: string) => `/api/share/${linkId}`;

export const pictureUrl = (linkId: string, sheetId: string): string =>
  `${base(linkId)}/pictures/${encodeURIComponent(sheetId)}`;

export const paperUrl = (linkId: string, paperId: string): string =>
  `${base(linkId)}/papers/${encodeURIComponent(paperId)}`;

/** Where the company finds the proposal of a job. */
export const jobProposalUrl = (publicUrl: string, jobId: string): string =>
  new URL(`/jobs/${jobId}/proposal`, publicUrl).href;
