import { zipSync, type ZipOptions } from 'fflate';
import { inThrees, indexMesh } from './indexed-mesh';
import { encode } from './obj-files';
import type { Corners } from './shapes';

export const coreNamespace = 'http://schemas.microsoft.com/3dmanufacturing/core/2015/02';
const productionNamespace = 'http://schemas.microsoft.com/3dmanufacturing/production/2015/06';

export const relationships = (target = '/3D/3dmodel.model'): string =>
  `<?xml version="1.0" encoding="UTF-8"?><Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship Target="${target}" Id="rel0" Type="http://schemas.microsoft.com/3dmanufacturing/2013/01/3dmodel"/></Relationships>`;

/** A mesh as an element of a model. */
export function writeMeshXml(corners: Corners): string {
  const { vertices, triangles } = indexMesh(corners);
  const points = inThrees(vertices).map(([x, y, z]) => `<vertex x="${x}" y="${y}" z="${z}"/>`);
  const faces = inThrees(triangles).map(([a, b, c]) => `<triangle v1="${a}" v2="${b}" v3="${c}"/>`);
  return `<mesh><vertices>${points.join('\n')}</vertices><triangles>${faces.join('\n')}</triangles></mesh>`;
}

/** A model of resources and what is built of them. */
export const writeModel = (resources: string, build: string, attributes = 'unit="millimeter"'): string =>
  `<?xml version="1.0" encoding="UTF-8"?>\n<model ${attributes} xml:lang="en-US" xmlns="${coreNamespace}" xmlns:p="${productionNamespace}"><resources>${resources}</resources><build>${build}</build></model>`;

/** An archive of files in words or bytes. */
export function zipFiles(files: Record<string, string | Uint8Array>, options: ZipOptions = {}): Uint8Array<ArrayBuffer> {
  const entries = Object.entries(files).map(([name, content]) => [name, typeof content === 'string' ? encode(content) : content] as const);
  return Uint8Array.from(zipSync(Object.fromEntries(entries), { mtime: '2026-01-01', ...options }));
}

/** A 3MF file of one model. */
export const packModel = (model: string, others: Record<string, string> = {}): Uint8Array<ArrayBuffer> => zipFiles({ '_rels/.rels': relationships(), '3D/3dmodel.model': model, ...others });

/** A 3MF file of one mesh that is built once. */
export const write3mf = (corners: Corners, attributes?: string): Uint8Array<ArrayBuffer> => packModel(writeModel(`<object id="1">${writeMeshXml(corners)}</object>`, '<item objectid="1"/>', attributes));
