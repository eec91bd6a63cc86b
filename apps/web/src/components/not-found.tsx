import { Link } from 'react-router-dom';
import { Crumbs } from './page';
import { MessagePage } from './message-page';

export function NotFound() {
  return (
    <>
      <Crumbs crumbs={[{ label: 'Not found' }]} />
      <MessagePage title="There is nothing here" actions={<Link to="/">All projects</Link>}>
        <p>The address may be mistyped, what it named may be gone, or it may belong to another organisation of yours: you can switch at the top right.</p>
      </MessagePage>
    </>
  );
}

export function Forbidden({ sentence }: { sentence: string }) {
  return (
    <>
      <Crumbs crumbs={[{ label: 'Not yours to see' }]} />
      <MessagePage title="This is not yours to see" actions={<Link to="/">All projects</Link>}>
        <p>{sentence}</p>
        <p className="soft">An administrator of your organisation can give you another role.</p>
      </MessagePage>
    </>
  );
}

