import { Button } from '@blueprintjs/core';
import { isRouteErrorResponse, Link, useRouteError } from 'react-router-dom';
import { MessagePage } from '../components/message-page';
import { ConnectionError, isProblem, ProblemError } from '../lib/problem';
import { Forbidden, NotFound } from '../components/not-found';

/** A new release takes away the files of the old one; loading the page again gets the new ones. */
function isMissingChunk(error: unknown): boolean {
  return error instanceof TypeError && /import|module/i.test(error.message);
}

export function RouteError() {
  const error = useRouteError();
  if (isProblem(error, 'not-found') || (isRouteErrorResponse(error) && error.status === 404)) return <NotFound />;
  if (isProblem(error, 'forbidden')) return <Forbidden sentence={error.problem.detail} />;
  const reload = (
    <Button intent="primary" onClick={() => location.reload()}>
      Load the page again
    </Button>
  );
  if (isMissingChunk(error)) {
    return (
      <MessagePage title="This page has been renewed" actions={reload}>
        <p>A new version of Masswright is running. Load the page again to go on with it.</p>
      </MessagePage>
    );
  }
  if (error instanceof ConnectionError || error instanceof ProblemError) {
    return (
      <MessagePage title="This can't be shown now" actions={reload}>
        <p>{error.message}</p>
        {error instanceof ProblemError && error.problem.requestId && (
          <p className="soft">
            If it stays, tell whoever runs Masswright this number: <code>{error.problem.requestId}</code>
          </p>
        )}
      </MessagePage>
    );
  }
  return (
    <MessagePage title="Something in this page broke" actions={<>{reload} <Link to="/">All projects</Link></>}>
      <p>What you had saved is safe. Load the page again; if it breaks again, tell whoever runs Masswright what you did last.</p>
    </MessagePage>
  );
}
