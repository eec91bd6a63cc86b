import { Database, refreshPartSummaries } from '@masswright/drizzle';
import { summarisePart } from '@masswright/mechanics';

/** Runs SQL past the policies. */
export type Look = <Row extends Record<string, unknown>>(sql: string, values?: unknown[]) => Promise<Row[]>;

export interface FilledProject {
  organisationId: string;
  projectId: string;
  userId: string;
  count: number;
  /** Every tenth has no unit, every eleventh no density, every thirteenth waits, every seventeenth failed, every nineteenth is not defensible. */
  mixed?: boolean;
}

/**
 * Blocks of aluminium as the worker would have measured them, with sides a = 10 + i mod 97, b = 20 + i mod 53, c = 5 + i mod 31 in mm, written straight
 * into the tables in one statement. Integrals of a block about its centre: V = abc, ∫x² = Va²/12 (standard handbook values, from memory).
 */
const insert = `
with source as (
  select i, $5::boolean and i % 10 = 0 as no_unit, $5::boolean and i % 11 = 0 as no_density, $5::boolean and i % 13 = 0 as waits, $5::boolean and i % 17 = 0 and i % 13 <> 0 as failed,
    $5::boolean and i % 19 = 0 as no_inside, (10 + i % 97)::float8 as a, (20 + i % 53)::float8 as b, (5 + i % 31)::float8 as c,
    sha256(($2 || ' file ' || i)::bytea) as hash, gen_random_uuid() as part_id, gen_random_uuid() as upload_id, gen_random_uuid() as revision_id, gen_random_uuid() as measurement_id,
    (array['bracket', 'housing', 'lever', 'spindle', 'cover', 'flange', 'rib', 'yoke'])[1 + i % 8] as word
  from generate_series(1, $4::int) i),
u as (insert into uploads (id, organisation_id, project_id, file_name, folder, size_bytes, part_size_bytes, object_key, multipart_id, state, sha256, created_by, stored_at)
  select upload_id, $1, $2::uuid, word || '_' || i || '.stl', 'batch ' || i / 100, 684, 8388608, 'meshes/' || upload_id, 'none', 'stored', hash, $3, now() from source),
p as (insert into parts (id, organisation_id, project_id, number, name) select part_id, $1, $2::uuid, i, word || ' ' || i from source),
r as (insert into revisions (id, organisation_id, part_id, ordinal, upload_id, created_by) select revision_id, $1, part_id, 1, upload_id, $3 from source),
s as (insert into settings (revision_id, organisation_id, length_unit, unit_stated_at, unit_stated_by, density_kg_m3, density_spread_kg_m3, material_id, material_name, axis, changed_by)
  select revision_id, $1, case when no_unit then null else 'mm' end, case when no_unit then null else now() end, case when no_unit then null else $3::uuid end,
    case when no_density then null else 2700 end, case when no_density then null else 27 end, case when no_density then null else 'al-6061-t6' end, case when no_density then null else 'Aluminium 6061-T6' end,
    '{"kind":"mesh","along":"z"}', $3 from source),
m as (insert into measurements (id, organisation_id, sha256, measuring_version, format, facets, origin, box_min, box_max, volume, volume_centre_from_origin, volume_second, area, area_centre_from_origin, area_second,
    closed, oriented, outward, turned, defensible, boundary_edges, non_manifold_edges, degenerate_facets, duplicate_facets, findings)
  select measurement_id, $1, hash, 'm1', 'stl-binary', 12, array[0, 0, 0]::float8[], array[0, 0, 0]::float8[], array[a, b, c], case when no_inside then null else a * b * c end,
    case when no_inside then null else array[a / 2, b / 2, c / 2] end,
    case when no_inside then null else array[a * b * c * a * a / 12, a * b * c * b * b / 12, a * b * c * c * c / 12, 0, 0, 0] end,
    2 * (a * b + b * c + c * a), array[a / 2, b / 2, c / 2], array[a * b, b * c, c * a, 0, 0, 0],
    not no_inside, not no_inside, true, false, not no_inside, 0, 0, 0, 0, '[]' from source where not waits and not failed)
insert into measuring_runs (organisation_id, revision_id, state, stage, progress, measurement_id, error_code, error_message, started_at, finished_at)
select $1, revision_id, case when waits then 'queued' when failed then 'failed' else 'done' end, case when waits then 'waiting' else 'storing' end, case when waits then 0 else 1 end,
  case when waits or failed then null else measurement_id end, case when failed then 'file-truncated' end, case when failed then 'The file ends too early.' end, now(), now() from source`;

/** Fills an empty project with parts; gives their ids by number. */
export async function fillProject(look: Look, applicationUrl: string, { organisationId, projectId, userId, count, mixed = false }: FilledProject): Promise<string[]> {
  await look(insert, [organisationId, projectId, userId, count, mixed]);
  await look('update projects set next_part_number = $2 where id = $1', [projectId, count + 1]);
  const ids = (await look<{ id: string }>('select id from parts where project_id = $1 order by number', [projectId])).map(({ id }) => id);
  const database = new Database({ url: applicationUrl, poolSize: 1, applicationName: 'filled-project' });
  try {
    await database.transaction({ organisationId }, (tx) => refreshPartSummaries(tx, organisationId, ids, summarisePart));
  } finally {
    await database.close();
  }
  return ids;
}
