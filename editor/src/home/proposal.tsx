import { useCallback, useEffect, useLayoutEffect, useRef, useState } from 'react';
import { flushSync } from 'react-dom';
import type { About } from './about';
import { Changes } from './changes';
import { type Choice, combinationOf, offered } from './choice';
import { Contact } from './contact';
import { Decline } from './decline';
import { useDraft } from './drafts';
import { GoodToKnow } from './good-to-know';
import { Included } from './included';
import { StateNotice } from './notice';
import { Papers } from './papers';
import { Payments } from './payments';
import { GardenPicture } from './picture/garden-picture';
import { type AskDraft, emptyDraft } from './questions/ask-draft';
import { ASK_FIELD } from './questions/ask-form';
import { Questions } from './questions/questions';
import { returnedOf } from './returned';
import { Review } from './review';
import type { Question, SharedPage } from './share';
import { REVIEW_BUTTON, SumBar } from './sum-bar';
import { TotalAloud, Totals } from './totals';
import { useStep } from './use-step';
import { useWatch } from './use-watch';
import { dayOf, dotted, proposalInWords, together } from './words';

interface Props {
  readonly linkId: string;
  readonly page: SharedPage;
  readonly refresh: () => Promise<SharedPage>;
  readonly replace: (page: SharedPage) => void;
}

/** One proposal: to look at, to ask about, to choose from and to answer. */
export function Proposal({ linkId, page, refresh, replace }: Props) {
  const { document, state } = page;
  const { step, open, close } = useStep();
  const [choice, choose] = useChoice(linkId, page);
  const [draft, setDraft] = useDraft<AskDraft>(`${linkId}:ask`, emptyDraft);
  const [chosenId, setChosenId] = useState<string | null>(null);
  const [placing, setPlacing] = useState(false);
  const [overtaken, setOvertaken] = useState(false);
  const [returned] = useState(() =>
    returnedOf(
      window.location.search,
      page.dues.map(({ id }) => id),
    ),
  );
  const sums = combinationOf(document.price, choice);
  const reviewing = step === 'review' && state === 'open' && sums?.offerable === true;
  const declining = step === 'decline' && state === 'open';
  const canAsk = state !== 'withdrawn';

  const { tired, again } = useWatch(
    page.dues.some(({ pending }) => pending) || page.papers.some(({ url }) => url === null),
    refresh,
  );

  useTitle(page);
  useScreens(reviewing ? 'review' : declining ? 'decline' : 'page');
  useWholeInPrint();

  const askAbout = (about: About): void => {
    setPlacing(false);
    setDraft({ ...draft, about });
    goTo(ASK_FIELD);
  };

  const keep = useCallback(
    (question: Question): void => {
      const others = page.questions.filter(({ id }) => id !== question.id);
      const known = others.length < page.questions.length;
      replace({
        ...page,
        questions: known
          ? page.questions.map((old) => (old.id === question.id ? question : old))
          : [...page.questions, question],
      });
    },
    [page, replace],
  );

  const answered = (next: SharedPage): void => {
    // The page has found its old place again before it is led to what there is to say now.
    flushSync(() => {
      close('done');
      setOvertaken(false);
      replace(next);
    });
    goTo(next.state);
  };

  const conflict = async (): Promise<void> => {
    const next = await refresh();
    if (next.state === 'open' && next.revisionId === page.revisionId && next.hash === page.hash) return;
    setOvertaken(next.state === 'open');
    close('done');
  };

  return (
    <>
      {reviewing && (
        <main className="page">
          <Review
            linkId={linkId}
            page={page}
            choice={choice}
            sums={sums}
            onBack={close}
            onApproved={answered}
            onConflict={conflict}
          />
        </main>
      )}
      {declining && (
        <main className="page">
          <Decline linkId={linkId} page={page} onBack={close} onDeclined={answered} />
        </main>
      )}
      {/* Kept while another screen lies in front of it: zoom, unfolded lists and all. */}
      <main className="page" hidden={reviewing || declining}>
        <header className="page-head">
          <p className="quiet">
            {dotted([
              document.company.name,
              ...proposalInWords(document),
              together(`valid to ${dayOf(document.validUntil, document.locale)}`),
            ])}
          </p>
          <h1>{document.job.property || document.job.name} after dark</h1>
        </header>
        <div className="columns">
          <div className="top">
            {overtaken && (
              <div className="notice" role="alert">
                <h2>The proposal has changed</h2>
                <p>
                  A newer version came while you had this open. It is shown now; please look through it again.
                </p>
              </div>
            )}
            <StateNotice page={page}>
              <Payments linkId={linkId} page={page} returned={returned} tired={tired} onCheck={again} />
            </StateNotice>
            <Changes page={page} />
            {state === 'open' && page.dues.length > 0 && (
              <Payments aside linkId={linkId} page={page} returned={returned} tired={tired} onCheck={again} />
            )}
          </div>
          <div className="stays">
            <GardenPicture
              linkId={linkId}
              page={page}
              choice={choice}
              chosenId={chosenId}
              onChoose={setChosenId}
              canAsk={canAsk}
              pending={draft.about}
              placing={placing}
              onPlacing={setPlacing}
              onAsk={askAbout}
              onQuestion={(id) => goTo(`question-${id}`)}
            />
          </div>
          <div className="sums">
            <div>
              <Included document={document} choice={choice} onChoose={state === 'open' ? choose : null} />
              {sums && <Totals document={document} sums={sums} />}
              {sums && <TotalAloud document={document} sums={sums} />}
            </div>
            <GoodToKnow document={document} />
            <Questions
              linkId={linkId}
              page={page}
              canAsk={canAsk}
              draft={draft}
              onDraft={setDraft}
              onQuestion={keep}
              onShow={(about) => {
                if (about.kind === 'light') setChosenId(about.recordId);
                window.document
                  .querySelector('.stays')
                  ?.scrollIntoView({ block: 'start', behavior: 'smooth' });
              }}
            />
            <Papers papers={page.papers} />
            <div className="foot">
              <Contact company={document.company} />
              {state === 'open' && (
                <button type="button" className="quiet-button" onClick={() => open('decline')}>
                  Decline this proposal
                </button>
              )}
            </div>
          </div>
        </div>
        {state === 'open' && <SumBar document={document} sums={sums} onReview={() => open('review')} />}
      </main>
    </>
  );
}

/** What was approved, or else what is being chosen: kept in this tab, version by version. */
function useChoice(linkId: string, page: SharedPage): [Choice, (choice: Choice) => void] {
  const { price } = page.document;
  const [kept, keep] = useDraft<{ revisionId: string; groups: readonly string[] } | null>(
    `${linkId}:choice`,
    null,
  );
  const mine = kept?.revisionId === page.revisionId ? new Set(kept.groups) : null;
  const agreed = page.state === 'approved' && page.approval ? new Set(page.approval.groups) : null;
  const choice =
    agreed ?? (mine && combinationOf(price, mine)?.offerable ? mine : new Set(offered(price)?.groups ?? []));
  return [choice, (next) => keep({ revisionId: page.revisionId, groups: [...next] })];
}

function useTitle({ document }: SharedPage): void {
  const { job, company } = document;
  useEffect(() => {
    window.document.title = `${job.property || job.name} after dark · ${company.name}`;
  }, [job, company]);
}

/** A screen begins at its head; the page is found again where it was left. */
function useScreens(screen: 'page' | 'review' | 'decline'): void {
  const left = useRef(0);
  const shown = useRef(screen);
  useLayoutEffect(() => {
    const before = shown.current;
    shown.current = screen;
    if (before === screen) return;
    if (screen === 'page') {
      window.scrollTo(0, left.current);
      window.document.getElementById(REVIEW_BUTTON)?.focus({ preventScroll: true });
      return;
    }
    window.scrollTo(0, 0);
    window.document.querySelector<HTMLElement>('main:not([hidden]) h1')?.focus({ preventScroll: true });
  }, [screen]);
  useEffect(() => {
    const note = (): void => {
      if (shown.current === 'page') left.current = window.scrollY;
    };
    window.addEventListener('scroll', note, { passive: true });
    return () => window.removeEventListener('scroll', note);
  }, []);
}

/** What is folded is printed as well. */
function useWholeInPrint(): void {
  useEffect(() => {
    const unfold = (): void => {
      for (const details of window.document.querySelectorAll('details')) details.open = true;
    };
    window.addEventListener('beforeprint', unfold);
    return () => window.removeEventListener('beforeprint', unfold);
  }, []);
}

function goTo(id: string): void {
  const element = window.document.getElementById(id);
  element?.focus({ preventScroll: true });
  element?.scrollIntoView?.({ block: 'center', behavior: 'smooth' });
}
