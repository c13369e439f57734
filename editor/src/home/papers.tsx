import type { SharedPage } from './share';

/** Documents to open or keep. */
export function Papers({ papers }: { readonly papers: SharedPage['papers'] }) {
  if (papers.length === 0) return null;
  return (
    <section aria-labelledby="papers">
      <h2 id="papers">Documents</h2>
      <ul className="plain-list">
        {papers.map(({ id, name, url }) => (
          <li key={id}>
            {url === null ? (
              <span className="quiet">{name}: being made, it will be here in a moment</span>
            ) : (
              <a className="row-link" href={url} target="_blank" rel="noreferrer">
                {name} <span className="quiet">PDF</span>
              </a>
            )}
          </li>
        ))}
      </ul>
    </section>
  );
}
