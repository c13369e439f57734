import type { ReactNode } from 'react';
import styles from './states.module.css';
import type { Trouble } from './trouble';

function Alone({ title, children }: { readonly title: string; readonly children: ReactNode }) {
  return (
    <main className={styles.alone}>
      <svg viewBox="0 0 24 24" width="40" height="40" aria-hidden="true" focusable="false">
        <path d="M3.500 13a8.500 8.500 0 0 1 17 0z" fill="var(--ink)" />
        <path d="M7.200 15.200h9.600L20.500 21h-17z" fill="var(--chalk)" />
      </svg>
      <h1>{title}</h1>
      {children}
    </main>
  );
}

export const UnknownLink = () => (
  <Alone title="There is no proposal at this address">
    <p>The link may have lost a part on its way. Please open it from the mail again, or copy all of it.</p>
  </Alone>
);

/** Back from the card service, in a browser that the proposal was not opened in. */
export const OtherBrowser = () => (
  <Alone title="Please open the proposal from its mail">
    <p>
      This browser does not know the proposal, so it can’t be shown here. Whether a payment went through
      stands on its page: open it by the link in the mail. For a payment that did, a receipt comes by mail as
      well.
    </p>
  </Alone>
);

export const GoneLink = () => (
  <Alone title="This link is no longer valid">
    <p>It has run out or was called back. Please ask the company that sent it for a new one.</p>
  </Alone>
);

/** Why the page could not be loaded, and a way on. */
export function LoadFailed({
  trouble,
  onRetry,
}: {
  readonly trouble: Trouble;
  readonly onRetry: () => void;
}) {
  if (trouble.status === 404) return <UnknownLink />;
  if (trouble.status === 410) return <GoneLink />;
  const offline = trouble.status === 0;
  return (
    <Alone title={offline ? 'No connection' : 'The proposal could not be loaded'}>
      <p role="alert">{trouble.message}</p>
      <button type="button" className="lamp-button" onClick={onRetry}>
        Try again
      </button>
    </Alone>
  );
}

const Bone = ({ width, height = 20 }: { readonly width: string; readonly height?: number }) => (
  <span className={styles.bone} style={{ width, height }} />
);

/** The outline of the page, in the places that its parts will have. */
export function Skeleton() {
  return (
    <main className="page" aria-busy="true">
      <p className="visually-hidden" role="status">
        Loading the proposal …
      </p>
      <div className="page-head">
        <div className={styles.line}>
          <Bone width="78%" height={16} />
        </div>
        <div className={styles.title}>
          <Bone width="64%" height={26} />
        </div>
      </div>
      <div className="columns">
        <div className="stays">
          <div className={styles.frame} />
        </div>
        <div className="sums">
          <Bone width="46%" height={22} />
          {['80%', '70%', '74%', '58%'].map((width) => (
            <div key={width} className={styles.row}>
              <Bone width={width} />
            </div>
          ))}
        </div>
      </div>
    </main>
  );
}
