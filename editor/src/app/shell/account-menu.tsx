import { DropdownMenu } from '@radix-ui/themes';
import { useNavigate } from 'react-router-dom';
import { ChevronDown } from '../../components/icons';
import { showProblem } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { useMe } from '../../lib/me';
import { useSignOut, useSwitchCompany } from '../../lib/session';
import { paths } from '../paths';
import styles from './shell.module.css';

/** First letters of the first and last word of a name. */
export function initialsOf(name: string): string {
  const words = name.trim().split(/\s+/);
  const letters = words.length > 1 ? [words[0], words.at(-1)] : [words[0]];
  return letters
    .map((word) => Array.from(word ?? '')[0] ?? '')
    .join('')
    .toUpperCase();
}

export function AccountMenu() {
  const me = useMe();
  const navigate = useNavigate();
  const signOut = useSignOut();
  const switchCompany = useSwitchCompany();
  const complain = (error: unknown) => void showProblem(sentenceOf(error));
  const others = me.companies.filter((company) => company.id !== me.company?.id);

  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger>
        <button type="button" className={styles.account}>
          <span className="visually-hidden">Account of {me.user.name}, </span>
          <span className={styles.company}>{me.company?.name ?? me.user.name}</span>
          <span className={styles.initials} aria-hidden="true">
            {initialsOf(me.user.name)}
          </span>
          <ChevronDown />
        </button>
      </DropdownMenu.Trigger>
      <DropdownMenu.Content align="end" color="gray">
        <div className={styles.who}>
          <strong>{me.user.name}</strong>
          <br />
          <span className="quiet">
            {me.company ? `${me.company.name} · ${me.role}` : 'In no company at present'}
          </span>
        </div>
        <DropdownMenu.Separator />
        <DropdownMenu.Item onSelect={() => navigate(paths.account)}>Your account</DropdownMenu.Item>
        {me.company && (
          <DropdownMenu.Item onSelect={() => navigate(paths.people)}>People of the company</DropdownMenu.Item>
        )}
        {others.length > 0 && (
          <>
            <DropdownMenu.Separator />
            <DropdownMenu.Label>Change to</DropdownMenu.Label>
            {others.map((company) => (
              <DropdownMenu.Item
                key={company.id}
                onSelect={() =>
                  switchCompany.mutate(company.id, {
                    onSuccess: () => navigate(paths.jobs),
                    onError: complain,
                  })
                }
              >
                {company.name}
              </DropdownMenu.Item>
            ))}
          </>
        )}
        <DropdownMenu.Separator />
        <DropdownMenu.Item
          onSelect={() =>
            void signOut.mutateAsync().then(() => navigate(paths.signIn, { replace: true }), complain)
          }
        >
          Sign out
        </DropdownMenu.Item>
      </DropdownMenu.Content>
    </DropdownMenu.Root>
  );
}
