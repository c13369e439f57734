import { type ReactNode, useEffect, useId, useRef } from 'react';
import { Button } from '../../../components/button';
import { CloseIcon } from '../../../components/icons';
import { useEditor } from './context';
import styles from './page.module.css';

interface PanelFrameProps {
  readonly title: string;
  readonly children: ReactNode;
  readonly onClose?: () => void;
  /** The edge of the drawing that it stands at. */
  readonly side?: 'start' | 'end';
}

/** A panel over the drawing's edge; the drawing stays usable beside it. */
export function PanelFrame({ title, children, onClose, side = 'end' }: PanelFrameProps) {
  const editor = useEditor();
  const id = useId();
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => {
    heading.current?.focus();
  }, []);
  return (
    <section className={styles.panel} data-side={side} aria-labelledby={id}>
      <header>
        <h2 id={id} ref={heading} tabIndex={-1}>
          {title}
        </h2>
        <Button
          kind="bare"
          icon
          aria-label={`Close: ${title}`}
          onClick={onClose ?? (() => editor.session.setState({ panel: 'none' }))}
        >
          <CloseIcon />
        </Button>
      </header>
      <div className={styles.panelBody}>{children}</div>
    </section>
  );
}
