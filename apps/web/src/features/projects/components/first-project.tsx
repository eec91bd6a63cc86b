import type { ReactNode } from 'react';
import './projects.css';

const steps = [
  { title: 'A project holds parts', text: 'Name it after the thing that you design, such as a reel or a gimbal.' },
  { title: 'A mesh goes in', text: 'Drop STL files into it and say in which unit they are drawn and of what density the part is.' },
  { title: 'A statement comes out', text: 'Mass, centre of mass and the full inertia tensor, about any axis, with what they rest on beside them.' },
] as const;

/** What an organisation without projects sees: what happens next, and the one thing to do. */
export function FirstProject({ action }: { action?: ReactNode }) {
  return (
    <section className="first-project" aria-labelledby="first-project-title">
      <h2 id="first-project-title">{action ? 'Begin with a project' : 'There is no project yet'}</h2>
      <ol className="first-project-steps">
        {steps.map((step, index) => (
          <li key={step.title}>
            <span className="figure soft">{index + 1}</span>
            <h3>{step.title}</h3>
            <p className="soft">{step.text}</p>
          </li>
        ))}
      </ol>
      {action ?? <p className="soft">An engineer or an administrator of your organisation can make one.</p>}
    </section>
  );
}
