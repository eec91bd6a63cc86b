import { deriveLinkToken } from '@masswright/jobs';
import { get, DemoPerson } from './installation';
import { makeDemoMeshes, type DemoMesh } from './meshes';

// Fills an installation that nobody uses yet, by the same requests that a person's browser makes. Run again it changes nothing.
const publicUrl = process.env['PUBLIC_URL'] ?? '';
const linkSecret = process.env['LINK_SECRET'] ?? '';
const password = 'wind over the headland';
const administrator = { email: 'ines.marsh@halyard.example', name: 'Ines Marsh' };
const colleagues = [
  { email: 'tomas.weir@halyard.example', name: 'Tomas Weir', role: 'engineer' },
  { email: 'oda.lindqvist@halyard.example', name: 'Oda Lindqvist', role: 'reviewer' },
  { email: 'ruben.achterberg@halyard.example', name: 'Ruben Achterberg', role: 'reader' },
] as const;

async function isSeeded(): Promise<boolean> {
  const { response } = await new DemoPerson(publicUrl).api.POST('/api/v1/sign-in', { body: { email: administrator.email, password } });
  return response.ok;
}

async function addMesh(person: DemoPerson, projectId: string, mesh: DemoMesh): Promise<void> {
  const { api } = person;
  const upload = get(await api.POST('/api/v1/projects/{projectId}/uploads', { params: { path: { projectId } }, body: { fileName: mesh.fileName, sizeBytes: mesh.bytes.length } }));
  const path = { uploadId: upload.id };
  const partNumbers = Array.from({ length: upload.partCount }, (_, index) => index + 1);
  const { grants } = get(await api.POST('/api/v1/uploads/{uploadId}/part-grants', { params: { path }, body: { partNumbers } }));
  for (const { partNumber, url } of grants) {
    const begin = (partNumber - 1) * upload.partSizeBytes;
    const sent = await fetch(url, { method: 'PUT', body: mesh.bytes.slice(begin, begin + upload.partSizeBytes) });
    if (!sent.ok) throw new Error(`The storage refused a part: ${sent.status}.`);
  }
  get(await api.POST('/api/v1/uploads/{uploadId}/completion', { params: { path }, body: { partName: mesh.partName, setting: mesh.setting } }));
}

async function seed(): Promise<void> {
  const ines = new DemoPerson(publicUrl);
  get(await ines.api.POST('/api/v1/sign-up', { body: { organisationName: 'Halyard Kites', ...administrator, password } }));
  for (const { email, name, role } of colleagues) {
    const { id } = get(await ines.api.POST('/api/v1/invitations', { body: { email, role } }));
    const token = deriveLinkToken(linkSecret, 'invitation', id);
    get(await new DemoPerson(publicUrl).api.POST('/api/v1/invitations/acceptance', { body: { as: 'new-person', token, name, password } }));
  }
  const reel = get(await ines.api.POST('/api/v1/projects', { body: { name: 'Reel, mark 2' } }));
  for (const mesh of await makeDemoMeshes()) await addMesh(ines, reel.id, mesh);
}

if (!(await isSeeded())) await seed();
const signIns = [{ ...administrator, role: 'administrator' }, ...colleagues].map(({ email, role }) => ({ email, password, role }));
console.log(JSON.stringify({ signIns }));
