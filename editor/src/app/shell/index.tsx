import { Link, NavLink, Outlet, ScrollRestoration, useLocation, useNavigation } from 'react-router-dom';
import {
  BoardIcon,
  CatalogueIcon,
  ClientsIcon,
  CompanyIcon,
  JobsIcon,
  NumbersIcon,
} from '../../components/icons';
import { Mark } from '../../components/mark';
import { useAbilities, useMe } from '../../lib/me';
import { paths } from '../paths';
import { AccountMenu } from './account-menu';
import { NoCompany } from './no-company';
import styles from './shell.module.css';

const places = [
  { to: paths.jobs, label: 'Jobs', icon: JobsIcon },
  { to: paths.board, label: 'Board', icon: BoardIcon },
  { to: paths.clients, label: 'Clients', icon: ClientsIcon },
  { to: paths.catalogue, label: 'Catalogue', icon: CatalogueIcon },
  { to: paths.company, label: 'Company', icon: CompanyIcon },
] as const;
const ownersPlaces = [...places, { to: paths.numbers, label: 'Numbers', icon: NumbersIcon }] as const;

/** The frame of every screen but the plan page: a bar on top; on a phone the places move to the foot. */
export function Shell() {
  const navigation = useNavigation();
  const { pathname } = useLocation();
  const me = useMe();
  const { seeNumbers } = useAbilities();
  return (
    <div className={styles.shell} data-phone-foot="">
      <a href="#main" className={styles.skip}>
        Skip to the content
      </a>
      <header className={styles.bar}>
        <Link to={paths.jobs} className={styles.brand}>
          <Mark />
          Lampwright
        </Link>
        <nav className={styles.places} aria-label="Main">
          {(seeNumbers ? ownersPlaces : places).map(({ to, label, icon: Icon }) => (
            <NavLink key={to} to={to} className={styles.place}>
              <span className={styles.icon}>
                <Icon />
              </span>
              {label}
            </NavLink>
          ))}
        </nav>
        <AccountMenu />
        {navigation.state === 'loading' && <div className={styles.progress} aria-hidden="true" />}
      </header>
      <main id="main" className={styles.main} tabIndex={-1}>
        {me.company === null && pathname !== paths.account ? <NoCompany /> : <Outlet />}
      </main>
      <ScrollRestoration />
    </div>
  );
}
