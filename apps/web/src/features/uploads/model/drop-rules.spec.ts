import { describe, expect, it } from 'vitest';
import { describeExcess, separateMeshes } from './drop-rules';

const dropped = (name: string, size = 10) => ({ file: Object.defineProperty(new File(['x'], name), 'size', { value: size }), folder: '' });
const names = (files: { file: File }[]): string[] => files.map(({ file }) => file.name);

describe('what a drop may hold', () => {
  it('sends meshes by their names and leaves the rest for the person to say', () => {
    const { meshes, others } = separateMeshes(['a.stl', 'B.STL', 'c.obj.gz', 'd.OBJ', 'e.ply', 'f.off', 'g.3MF', 'h.glb', 'i.gltf', 'j.ply.gz', 'notes.txt', 'skin.png', '.gz.stl.zip', 'archive.gz', 'stl', '.DS_Store'].map((name) => dropped(name)));
    expect(names(meshes)).toEqual(['a.stl', 'B.STL', 'c.obj.gz', 'd.OBJ', 'e.ply', 'f.off', 'g.3MF', 'h.glb', 'i.gltf', 'j.ply.gz']);
    expect(names(others)).toEqual(['notes.txt', 'skin.png', '.gz.stl.zip', 'archive.gz', 'stl', '.DS_Store']);
  });
  it('takes 500 files and 5 GB, and says by how much one is over', () => {
    expect(describeExcess(Array.from({ length: 500 }, () => dropped('a.stl', 10_000_000)))).toBeUndefined();
    expect(describeExcess(Array.from({ length: 612 }, () => dropped('a.stl')))).toContain('so 112 are too many');
    expect(describeExcess([dropped('a.stl', 5_000_000_000), dropped('b.stl', 250_000_000)])).toContain('so 250 MB are too much');
  });
});
