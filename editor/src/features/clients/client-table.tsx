import { Link } from 'react-router-dom';
import { Table } from '../../components/table';
import type { Client } from '../../lib/clients';
import styles from './clients.module.css';

interface ClientTableProps {
  readonly clients: readonly (Client & { readonly jobs: number })[];
  /** Where a client's name leads. */
  readonly hrefOf: (clientId: string) => string;
}

export function ClientTable({ clients, hrefOf }: ClientTableProps) {
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
              <Link to={hrefOf(client.id)} className={styles.name}>
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
