import { Link } from 'react-router-dom';
import { formatDay, formatMoment } from '../../lib/format';
import type { Job } from '../../lib/jobs';
import styles from './job-page.module.css';

/** Who, where and when, beside the job's sheets. */
export function JobFacts({ job, clientHref }: { job: Job; clientHref: string }) {
  return (
    <dl className={styles.facts}>
      <div>
        <dt>Client</dt>
        <dd>
          <Link to={clientHref}>{job.client.name}</Link>
          {job.client.phone && (
            <a href={`tel:${job.client.phone.replace(/[^+\d]/g, '')}`}>{job.client.phone}</a>
          )}
          {job.client.email && (
            <a href={`mailto:${job.client.email}`}>
              {job.client.email.slice(0, job.client.email.indexOf('@'))}
              <wbr />
              {job.client.email.slice(job.client.email.indexOf('@'))}
            </a>
          )}
        </dd>
      </div>
      <div>
        <dt>Property</dt>
        <dd>
          {!job.property.address.startsWith(job.property.name) && <span>{job.property.name}</span>}
          {job.property.address !== '' && <span>{job.property.address}</span>}
        </dd>
      </div>
      {job.property.accessNotes !== '' && (
        <div>
          <dt>Getting in</dt>
          <dd className={styles.keepLines}>{job.property.accessNotes}</dd>
        </div>
      )}
      <div>
        <dt>Site walk</dt>
        <dd>{job.siteWalkOn ? formatDay(job.siteWalkOn) : <span className="quiet">No date yet</span>}</dd>
      </div>
      <div>
        <dt>Install</dt>
        <dd>{job.installOn ? formatDay(job.installOn) : <span className="quiet">No date yet</span>}</dd>
      </div>
      <div>
        <dt>System</dt>
        <dd>{job.existingSystem ? 'Existing, to be surveyed' : 'New'}</dd>
      </div>
      <div>
        <dt>Changed</dt>
        <dd>
          <time dateTime={job.updatedAt}>{formatMoment(job.updatedAt)}</time>
        </dd>
      </div>
    </dl>
  );
}
