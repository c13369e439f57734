import type { ShareDocument } from './share';

type Company = ShareDocument['company'];

export const callAt = (phone: string): string => `tel:${phone.replace(/[^\d+]/g, '')}`;

/** Phone and mail of the company, as links in running text: "call 555 0100 or write to office@…". */
export function HowToReach({ company }: { readonly company: Company }) {
  const phone = company.phone !== '' && <a href={callAt(company.phone)}>{company.phone}</a>;
  const mail = company.email !== '' && <a href={`mailto:${company.email}`}>{company.email}</a>;
  if (phone && mail)
    return (
      <>
        call {phone} or write to {mail}
      </>
    );
  if (phone) return <>call {phone}</>;
  if (mail) return <>write to {mail}</>;
  return <>answer the mail that this link came with</>;
}

/** Who stands behind the proposal. */
export function Contact({ company }: { readonly company: Company }) {
  return (
    <footer className="contact">
      <h2>{company.name}</h2>
      <address>
        {company.phone !== '' && (
          <a className="button" href={callAt(company.phone)}>
            Call {company.phone}
          </a>
        )}
        {company.email !== '' && (
          <a className="button" href={`mailto:${company.email}`}>
            Write to {company.email}
          </a>
        )}
        {company.address !== '' && <p>{company.address}</p>}
        {company.licence !== '' && <p>Licence {company.licence}</p>}
      </address>
    </footer>
  );
}
