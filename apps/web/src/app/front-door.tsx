import { Outlet } from 'react-router-dom';
import { WordMark } from '../components/word-mark';
import './front-door.css';

/** The pages before signing in: what this is on one side, the form on the other. */
export function Component() {
  return (
    <div className="front-door">
      <aside className="front-door-words">
        <WordMark size={30} />
        <div>
          <p className="front-door-lead">What a part weighs, where it balances and how hard it is to turn. Before it exists.</p>
          <p className="soft">From a triangle mesh, a unit and a density: a mass-properties statement that a team can stand behind.</p>
        </div>
        <svg className="front-door-drawing" viewBox="0 0 480 150" aria-hidden="true" focusable="false">
          <path className="drawing-hair" d="M20 62V26M460 62V26M240 62V26M20 34H460" />
          <path className="drawing-tick" d="M235 29l10 10M15 29l10 10M455 29l10 10" />
          <path className="drawing-beam" d="M20 66H460" />
          <path className="drawing-fulcrum" d="M302 70 324 108H280Z" />
          <path className="drawing-ground" d="M250 108.5H354" />
          <path className="drawing-hair" d="M302 118V138M240 118V138M240 132H302" />
        </svg>
      </aside>
      <main id="main" tabIndex={-1} className="front-door-main">
        <Outlet />
      </main>
    </div>
  );
}
