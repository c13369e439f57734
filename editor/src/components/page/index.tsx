import { type ReactNode, useEffect, useId, useRef } from 'react';
import { Link, useLocation } from 'react-router-dom';
import { ChevronLeft } from '../icons';
import styles from './page.module.css';

/** Names the browser tab for the screen that is shown. */
export function useDocumentTitle(title: string): void {
  useEffect(() => {
    document.title = `${title} · Lampwright`;
  }, [title]);
}

/**
 * Moves focus to the screen's heading after a navigation, so that the keyboard and a screen reader start
 * there. The very first screen keeps the browser's own order.
 */
export function useHeadingFocus() {
  const heading = useRef<HTMLHeadingElement>(null);
  const { key } = useLocation();
  useEffect(() => {
    // React Router gives the first location of a visit the key 'default'.
    if (key === 'default') return;
    // A field that asked for the focus when it appeared keeps it.
    const active = document.activeElement;
    if (active && active !== document.body && active.matches('input, textarea, select')) return;
    heading.current?.focus({ preventScroll: true });
  }, [key]);
  return heading;
}

interface PageProps {
  readonly title: string;
  /** What the tab says, when the heading alone would not tell. */
  readonly tabTitle?: string;
  readonly lede?: ReactNode;
  readonly back?: { readonly to: string; readonly label: string };
  readonly actions?: ReactNode;
  /** One column: forms and settings. */
  readonly narrow?: boolean;
  /** As wide as the window: columns side by side. */
  readonly wide?: boolean;
  readonly children: ReactNode;
}

export function Page({
  title,
  tabTitle,
  lede,
  back,
  actions,
  narrow = false,
  wide = false,
  children,
}: PageProps) {
  useDocumentTitle(tabTitle ?? title);
  const heading = useHeadingFocus();
  return (
    <div className={styles.page} data-narrow={narrow ? '' : undefined} data-wide={wide ? '' : undefined}>
      {back && (
        <Link to={back.to} className={styles.back}>
          <ChevronLeft />
          {back.label}
        </Link>
      )}
      <div className={styles.head}>
        <div className={styles.headText}>
          <h1 ref={heading} tabIndex={-1} className={styles.title}>
            {title}
          </h1>
          {lede && <p className={styles.lede}>{lede}</p>}
        </div>
        {actions && <div className={styles.actions}>{actions}</div>}
      </div>
      {children}
    </div>
  );
}

interface SectionProps {
  readonly title: string;
  readonly lede?: ReactNode;
  readonly actions?: ReactNode;
  readonly children: ReactNode;
}

export function Section({ title, lede, actions, children }: SectionProps) {
  const id = useId();
  return (
    <section className={styles.section} aria-labelledby={id}>
      <div className={styles.sectionHead}>
        <h2 id={id}>{title}</h2>
        {actions && <div className={styles.actions}>{actions}</div>}
      </div>
      {lede && <p className={styles.sectionLede}>{lede}</p>}
      {children}
    </section>
  );
}
