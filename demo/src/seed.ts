import { createHash } from 'node:crypto';
import { deriveLinkToken } from '@masswright/jobs';
import { get, DemoPerson } from './installation';
import { makeDemoMeshes, type DemoMesh } from './meshes';

// Fills a local installation by the same requests that a person's browser makes. Begun again after an interruption it adds what is missing.
const publicUrl = process.env['PUBLIC_URL'] ?? '';
const linkSecret = process.env['LINK_SECRET'] ?? '';
const password = 'wind over the headland';
const administrator = { email: 'ines.marsh@halyard.example', name: 'Ines Marsh' };
const colleagues = [
  { email: 'tomas.weir@halyard.example', name: 'Tomas Weir', role: 'engineer' },
  { email: 'oda.lindqvist@halyard.example', name: 'Oda Lindqvist', role: 'reviewer' },
  { email: 'ruben.achterberg@halyard.example', name: 'Ruben Achterberg', role: 'reader' },
] as const;

async function addMesh(person: DemoPerson, projectId: string, mesh: DemoMesh): Promise<void> {
  const { api } = person;
  const upload = get(await api.POST('/api/v1/projects/{projectId}/uploads', { params: { path: { projectId } }, body: { fileName: mesh.fileName, sizeBytes: mesh.bytes.length } }));
  const path = { uploadId: upload.id };
  const bodies = Array.from({ length: upload.partCount }, (_, index) => mesh.bytes.slice(index * upload.partSizeBytes, (index + 1) * upload.partSizeBytes));
  const parts = bodies.map((body, index) => ({ partNumber: index + 1, sha256: createHash('sha256').update(body).digest('hex') }));
  const { grants } = get(await api.POST('/api/v1/uploads/{uploadId}/part-grants', { params: { path }, body: { parts } }));
  for (const { partNumber, url, headers } of grants) {
    const sent = await fetch(url, { method: 'PUT', headers, body: bodies[partNumber - 1] ?? null });
    if (!sent.ok) throw new Error(`The storage refused a part: ${sent.status}.`);
  }
  get(await api.POST('/api/v1/uploads/{uploadId}/completion', { params: { path }, body: { partName: mesh.partName, setting: mesh.setting } }));
}

async function signInOrUp(person: DemoPerson): Promise<void> {
  const { response } = await person.api.POST('/api/v1/sign-in', { body: { email: administrator.email, password } });
  if (!response.ok) get(await person.api.POST('/api/v1/sign-up', { body: { organisationName: 'Halyard Kites', ...administrator, password } }));
}

async function inviteMissing(ines: DemoPerson): Promise<void> {
  const members = new Set(get(await ines.api.GET('/api/v1/members')).items.map(({ email }) => email));
  for (const { email, name, role } of colleagues.filter((colleague) => !members.has(colleague.email))) {
    const { id } = get(await ines.api.POST('/api/v1/invitations', { body: { email, role } }));
    const token = deriveLinkToken(linkSecret, 'invitation', id);
    get(await new DemoPerson(publicUrl).api.POST('/api/v1/invitations/acceptance', { body: { as: 'new-person', token, name, password } }));
  }
}

async function addMissingMeshes(ines: DemoPerson): Promise<void> {
  const name = 'Reel, mark 2';
  const known = get(await ines.api.GET('/api/v1/projects')).items.find((project) => project.name === name);
  const reel = known ?? get(await ines.api.POST('/api/v1/projects', { body: { name } }));
  const parts = get(await ines.api.GET('/api/v1/projects/{projectId}/parts', { params: { path: { projectId: reel.id } } })).items;
  const names = new Set(parts.map((part) => part.name));
  for (const mesh of await makeDemoMeshes()) if (!names.has(mesh.partName)) await addMesh(ines, reel.id, mesh);
}

const ines = new DemoPerson(publicUrl);
await signInOrUp(ines);
await inviteMissing(ines);
await addMissingMeshes(ines);
await ines.api.POST('/api/v1/sign-out');
const signIns = [{ ...administrator, role: 'administrator' }, ...colleagues].map(({ email, role }) => ({ email, password, role }));
console.log(JSON.stringify({ signIns }));
