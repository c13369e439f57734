import { useQuery } from '@tanstack/react-query';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { formatDay } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import { type RevisionDetail, revisionQuery } from './api';
import { DifferencesList } from './differences';
import { FileLink } from './file-link';
import styles from './proposal.module.css';
import { combinationOf, dueWord } from './sums';

interface PreviewProps {
  readonly jobId: string;
  readonly revisionId: string;
}

/** What the homeowner gets: the paper, the sums, and what is different from before. */
export function Preview({ jobId, revisionId }: PreviewProps) {
  const detail = useQuery(revisionQuery(jobId, revisionId));
  if (detail.isPending)
    return (
      <Section title="What the client gets">
        <SkeletonRows rows={4} label="Loading the revision" />
      </Section>
    );
  if (detail.isError)
    return (
      <Section title="What the client gets">
        <Problem error={detail.error} onRetry={() => detail.refetch()} />
      </Section>
    );
  return <Sums detail={detail.data} />;
}

function Sums({ detail }: { readonly detail: RevisionDetail }) {
  const { revision, document, differences } = detail;
  const { price } = document;
  const money = moneyOf(document);
  const chosen = combinationOf(detail);
  const base = document.changes?.revision ?? revision.revision - 1;
  return (
    <Section
      title="What the client gets"
      lede={`Revision ${revision.revision} of ${formatDay(document.madeAt)}, valid until ${formatDay(document.validUntil)}.`}
      actions={revision.pdfUrl !== null && <FileLink href={revision.pdfUrl}>Open the PDF</FileLink>}
    >
      <div className={styles.sheets}>
        {chosen !== undefined && (
          <table className={styles.sums}>
            <caption className="visually-hidden">Price of revision {revision.revision}</caption>
            <thead>
              <tr>
                <th scope="col">Part</th>
                <th scope="col" className="figure">
                  Price
                </th>
              </tr>
            </thead>
            <tbody>
              {price.groups.map((group) => {
                const taken = group.id === null || chosen.groups.includes(group.id);
                return (
                  <tr key={group.id ?? 'base'} data-left={taken ? undefined : ''}>
                    <th scope="row">
                      {group.name}
                      {!taken && (
                        <span className="quiet">
                          {' · '}
                          {revision.approval === null ? 'offered on top, not in the total' : 'not taken'}
                        </span>
                      )}
                    </th>
                    <td className="figure">{money(group.priceMinor)}</td>
                  </tr>
                );
              })}
            </tbody>
            <tbody className={styles.totals}>
              {chosen.discountMinor > 0 && (
                <tr>
                  <th scope="row">{price.discountName || 'Discount'}</th>
                  <td className="figure">{money(-chosen.discountMinor)}</td>
                </tr>
              )}
              {price.tax !== null && (
                <tr>
                  <th scope="row">
                    {price.tax.name}, {price.tax.percent} %{' '}
                    <span className="quiet">of {money(chosen.taxableMinor)}</span>
                  </th>
                  <td className="figure">{money(chosen.taxMinor)}</td>
                </tr>
              )}
              <tr className={styles.total}>
                <th scope="row">Total</th>
                <td className="figure">{money(chosen.totalMinor)}</td>
              </tr>
              {chosen.stages.map((stage) => (
                <tr key={stage.id} className={styles.stage}>
                  <th scope="row">
                    {stage.name} <span className="quiet">{dueWord(stage.due)}</span>
                  </th>
                  <td className="figure">{money(stage.amountMinor)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        )}
        {differences !== null && (
          <div className={styles.differences}>
            <h3>
              {document.changes === null
                ? `What changed since revision ${base}`
                : `What changes against revision ${base}, which is approved`}
            </h3>
            <DifferencesList
              differences={differences}
              units={document.units}
              currency={document.currency}
              locale={document.locale}
            />
          </div>
        )}
      </div>
    </Section>
  );
}
