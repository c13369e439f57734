import { useEffect } from 'react';
import { isRouteErrorResponse, useRouteError } from 'react-router-dom';
import { Button, LinkButton } from '../components/button';
import { Mark } from '../components/mark';
import { Page, useDocumentTitle } from '../components/page';
import { ApiProblem } from '../lib/api/client';
import { paths } from './paths';
import styles from './route-failure.module.css';

/** While the first screen is on its way. */
export function StartingUp() {
  return (
    <div className={styles.starting} role="status" aria-label="Loading">
      <Mark size={40} />
    </div>
  );
}

function explain(error: unknown): { title: string; text: string } {
  if (isRouteErrorResponse(error) && error.status === 404)
    return { title: 'There is no such page', text: 'The address may be mistyped, or the page has moved.' };
  if (error instanceof ApiProblem)
    return error.status === 404
      ? { title: 'Not found', text: error.detail }
      : { title: 'This did not load', text: error.detail };
  // A chunk of an older build is gone once a new one is served.
  if (error instanceof TypeError && /dynamically imported module|module script/i.test(error.message))
    return {
      title: 'A newer version is there',
      text: 'Reload the page to go on with it. Nothing that you saved is lost.',
    };
  return {
    title: 'Something went wrong in this window',
    text: 'What you saved is safe. Reload the page; if it happens again, tell whoever looks after your Lampwright.',
  };
}

/** An error where a screen would be: inside the shell, or filling the window. */
export function RouteFailure({ inside = false }: { inside?: boolean }) {
  const error = useRouteError();
  const { title, text } = explain(error);
  useDocumentTitle(title);
  // For whoever is asked to help: the words above are for the person at the screen.
  useEffect(() => console.error(error), [error]);
  const actions = (
    <div className={styles.actions}>
      <Button kind="strong" onClick={() => window.location.reload()}>
        Reload the page
      </Button>
      <LinkButton to={paths.jobs}>Go to jobs</LinkButton>
    </div>
  );
  if (inside)
    return (
      <Page title={title} lede={text} narrow>
        {actions}
      </Page>
    );
  return (
    <main className={styles.window}>
      <Mark size={40} />
      <h1>{title}</h1>
      <p>{text}</p>
      {actions}
    </main>
  );
}
