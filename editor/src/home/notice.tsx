import type { ReactNode } from 'react';
import { HowToReach } from './contact';
import type { SharedPage } from './share';
import { dayOf, momentOf, moneyOf } from './words';

/** How things stand, above everything else; nothing for a proposal that simply waits for an answer. */
export function StateNotice({
  page,
  children,
}: {
  readonly page: SharedPage;
  readonly children?: ReactNode;
}) {
  const { document, approval } = page;
  const { company, locale } = document;
  const money = moneyOf(document);
  switch (page.state) {
    case 'open':
      if (!approval) return null;
      return (
        <div className="notice">
          <h2>A change to what you approved</h2>
          <p>
            You approved revision {approval.revision} on {dayOf(approval.at, locale)} for{' '}
            {money(approval.totalMinor)}. That stands until you approve this change.
          </p>
        </div>
      );
    case 'approved':
      return (
        <div className="notice" data-good="">
          <h2 id="approved" tabIndex={-1}>
            Thank you{approval ? `, ${approval.typedName}` : ''}
          </h2>
          {approval && (
            <p>
              You approved this on {momentOf(approval.at, locale)} for {money(approval.totalMinor)}. A signed
              copy comes by mail.
            </p>
          )}
          {children}
        </div>
      );
    case 'declined':
      return (
        <div className="notice">
          <h2 id="declined" tabIndex={-1}>
            You declined this proposal
          </h2>
          {page.decline && (
            <p>
              {company.name} was told on {dayOf(page.decline.at, locale)}
              {page.decline.reason === '' ? '.' : `: “${page.decline.reason}”`}
            </p>
          )}
          <p>
            Changed your mind? You can <HowToReach company={company} />.
          </p>
        </div>
      );
    case 'expired':
      return (
        <div className="notice">
          <h2>These prices were valid to {dayOf(document.validUntil, locale)}</h2>
          <p>
            To go ahead, ask for a new date: <HowToReach company={company} />.
          </p>
        </div>
      );
    case 'withdrawn':
      return (
        <div className="notice">
          <h2>This proposal was withdrawn</h2>
          <p>
            It can’t be approved any more. To hear what comes in its place, <HowToReach company={company} />.
          </p>
        </div>
      );
  }
}
