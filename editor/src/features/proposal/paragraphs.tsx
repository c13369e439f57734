import styles from './proposal.module.css';
import { paragraphsOf } from './words';

/** Plain text as it stands on the proposal; says so where there is none. */
export function Paragraphs({ text }: { readonly text: string }) {
  const paragraphs = paragraphsOf(text);
  if (paragraphs.length === 0) return <p className="quiet">Nothing: the heading is left out.</p>;
  return (
    <div className={styles.paragraphs}>
      {paragraphs.map((paragraph, i) => (
        <p key={i}>{paragraph}</p>
      ))}
    </div>
  );
}
