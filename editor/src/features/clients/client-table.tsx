import { Link } from 'react-router-dom';
import { to } from '../../app/paths';
import { Table } from '../../components/table';
import type { Client } from '../../lib/clients';
import styles from './clients.module.css';

export function ClientTable({ clients }: { clients: readonly (Client & { readonly jobs: number })[] }) {
  return (
    <Table label="Clients">
      <thead>
        <tr>
          <th scope="col">Name</th>
          <th scope="col" className={styles.wide}>
            E-mail
          </th>
          <th scope="col" className={styles.wide}>
            Phone
          </th>
          <th scope="col" data-align="end">
            Jobs
          </th>
        </tr>
      </thead>
      <tbody>
        {clients.map((client) => (
          <tr key={client.id} className={styles.row}>
            <td>
              <Link to={to.client(client.id)} className={styles.name}>
                {client.name}
              </Link>
              <div className={styles.below}>{client.phone ?? client.email}</div>
            </td>
            <td className={styles.wide}>{client.email ?? <span className="quiet">none</span>}</td>
            <td className={styles.wide}>{client.phone ?? <span className="quiet">none</span>}</td>
            <td data-align="end">{client.jobs}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
