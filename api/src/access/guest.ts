/** Somebody who came by the link of a proposal: no account, one proposal of one company. */
export interface Guest {
  readonly linkId: string;
  readonly companyId: string;
  readonly proposalId: string;
  readonly jobId: string;
  readonly name: string;
  readonly email: string;
}
