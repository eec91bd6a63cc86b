import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { ESLint } from 'eslint';
import tseslint from 'typescript-eslint';
import { workspaceRoot } from '../../../vite.shared.ts';

export interface Project {
  name: string;
  root: string;
  tags: string[];
}

interface Graph {
  graph: { nodes: Record<string, { name: string; data: { root: string; tags?: string[] } }> };
}

/** Every project of ours. Making the list also makes the graph that the boundary rule reads. */
export function listProjects(folder: string): Project[] {
  const file = path.join(folder, 'graph.json');
  execFileSync(path.join(workspaceRoot, 'node_modules/.bin/nx'), ['graph', `--file=${file}`], {
    cwd: workspaceRoot,
    env: { ...process.env, NX_DAEMON: 'false', NX_TUI: 'false' },
    stdio: ['ignore', 'ignore', 'pipe'],
  });
  const { graph } = JSON.parse(readFileSync(file, 'utf8')) as Graph;
  return Object.values(graph.nodes).map(({ name, data }) => ({ name, root: data.root, tags: data.tags ?? [] }));
}

/** Lint as it is, but for the rules that need types: what is planted is text under a path, not a file that the compiler knows. */
const eslint = new ESLint({ cwd: workspaceRoot, overrideConfig: [{ files: ['**/*.{ts,tsx}'], ...tseslint.configs.disableTypeChecked }] });

/** What lint says to a file with this text at this path, as `rule: message`. */
export async function lint(file: string, text: string): Promise<string[]> {
  const [result] = await eslint.lintText(text, { filePath: path.join(workspaceRoot, file) });
  if (!result) throw new Error(`${file} is ignored by lint`);
  return result.messages.map((message) => `${message.ruleId ?? 'fatal'}: ${message.message}`);
}

/** The rules that complain about an import of this from that file. */
export async function findRefusals(file: string, imported: string): Promise<string[]> {
  const messages = await lint(file, `import * as planted from '${imported}';\nexport const used = planted;\n`);
  return messages.map((message) => message.split(':')[0] ?? '');
}
