import { Page, Section } from '../../components/page';
import styles from '../../features/account/account.module.css';
import { EmailForm, PasswordForm } from '../../features/account/credentials';
import { DeleteAccount } from '../../features/account/delete-account';
import { NameForm, Preferences } from '../../features/account/profile';
import { Sessions } from '../../features/account/sessions';

export default function AccountScreen() {
  return (
    <Page title="Your account" narrow>
      <Section title="How you work">
        <div className={styles.body}>
          <Preferences />
        </div>
      </Section>
      <Section title="Name">
        <div className={styles.body}>
          <NameForm />
        </div>
      </Section>
      <Section title="E-mail">
        <div className={styles.body}>
          <EmailForm />
        </div>
      </Section>
      <Section title="Password">
        <div className={styles.body}>
          <PasswordForm />
        </div>
      </Section>
      <Section title="Where you are signed in">
        <Sessions />
      </Section>
      <Section
        title="Delete the account"
        lede="You leave every company. A company of which you are the only owner needs another owner first."
      >
        <DeleteAccount />
      </Section>
    </Page>
  );
}
