import styles from './good-to-know.module.css';
import type { ShareDocument } from './share';

/** The words of the proposal, after its sums. */
export function GoodToKnow({ document }: { readonly document: ShareDocument }) {
  const { words } = document;
  return (
    <>
      <Words title="The work" text={words.scope} />
      <Words title="When" text={words.timeline} />
      <Words title="Warranty" text={words.warranty} />
      <Words title="What is not included" text={words.exclusions} />
      <Words title="Before anybody digs" text={words.locate} />
      <Words title="Your right to cancel" text={words.cancellation} />
      {document.cautions.length > 0 && (
        <section>
          <h2>Safety</h2>
          <ul className={styles.cautions}>
            {document.cautions.map((caution) => (
              <li key={caution}>{caution}</li>
            ))}
          </ul>
        </section>
      )}
      {words.terms !== '' && (
        <section>
          <details className={styles.terms}>
            <summary>
              <h2>Terms</h2>
            </summary>
            <Paragraphs text={words.terms} />
          </details>
        </section>
      )}
    </>
  );
}

function Words({ title, text }: { readonly title: string; readonly text: string }) {
  if (text.trim() === '') return null;
  return (
    <section>
      <h2>{title}</h2>
      <Paragraphs text={text} />
    </section>
  );
}

/** Plain text whose paragraphs are parted by empty lines. */
export function Paragraphs({ text }: { readonly text: string }) {
  return text
    .split(/\n\s*\n/)
    .filter((paragraph) => paragraph.trim() !== '')
    .map((paragraph, i) => (
      <p key={i} className={styles.paragraph}>
        {paragraph.trim()}
      </p>
    ));
}
