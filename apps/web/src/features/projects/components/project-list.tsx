import type { Project } from '@masswright/contracts';
import { Link } from 'react-router-dom';
import { formatDay } from '../../../lib/format-time';
import { countOf } from '../../../lib/plural';
import './projects.css';

export function ProjectList({ projects }: { projects: readonly Project[] }) {
  return (
    <ul className="project-list">
      {projects.map((project) => (
        <li key={project.id}>
          <Link to={`/projects/${project.id}`} className="project-card">
            <span className="project-card-name">{project.name}</span>
            <span className="project-card-facts">
              <span>{project.parts === 0 ? 'No parts yet' : countOf(project.parts, 'part')}</span>
              <span className="soft">since {formatDay(project.createdAt)}</span>
            </span>
          </Link>
        </li>
      ))}
    </ul>
  );
}
