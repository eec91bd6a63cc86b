import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import type { AsMade, Axis, FacetDoubt, Finding, MeasuringRun, Measurement, MeshCompression, MeshFormat, Openings, Setting, Shell, ShellDensity } from '@masswright/contracts';
import { at, bytea, createdAt, ofOrganisation, primaryId } from './columns';
import { organisations, users } from './people';

export const projects = pgTable(
  'projects',
  {
    id: primaryId(),
    organisationId: ofOrganisation().references(() => organisations.id),
    name: text('name').notNull(),
    /** The next number of a part; numbers are never given twice. */
    nextPartNumber: integer('next_part_number').notNull().default(1),
    createdAt: createdAt(),
    createdBy: uuid('created_by').notNull(),
  },
  (table) => [
    unique('projects_organisation_id_id_key').on(table.organisationId, table.id),
    uniqueIndex('projects_name_key').on(table.organisationId, sql`lower(${table.name})`),
  ],
);

/** open: being sent. stored: a revision. cancelled: given up. discarded: its revision was deleted for good, and its object with it. */
export type UploadState = 'open' | 'stored' | 'cancelled' | 'discarded';

export const uploads = pgTable(
  'uploads',
  {
    id: primaryId(),
    organisationId: ofOrganisation(),
    projectId: uuid('project_id').notNull(),
    fileName: text('file_name').notNull(),
    /** Where in the dropped folder the file lay: a label. */
    folder: text('folder').notNull().default(''),
    sizeBytes: bigint('size_bytes', { mode: 'number' }).notNull(),
    partSizeBytes: integer('part_size_bytes').notNull(),
    /** One key an upload, never used again; it says nothing of the file. */
    objectKey: text('object_key').notNull(),
    multipartId: text('multipart_id').notNull(),
    state: text('state').$type<UploadState>().notNull().default('open'),
    /** Known once the worker has read the stored bytes. */
    sha256: bytea('sha256'),
    createdAt: createdAt(),
    createdBy: uuid('created_by').notNull(),
    storedAt: at('stored_at'),
  },
  (table) => [
    unique('uploads_organisation_id_id_key').on(table.organisationId, table.id),
    unique('uploads_object_key_key').on(table.objectKey),
    foreignKey({
      name: 'uploads_project_fkey',
      columns: [table.organisationId, table.projectId],
      foreignColumns: [projects.organisationId, projects.id],
    }),
    check('uploads_state_is_known', sql`${table.state} in ('open', 'stored', 'cancelled', 'discarded')`),
    // The same bytes are looked for by their hash, and before that is known by their number.
    index('uploads_sha256_index').on(table.organisationId, table.sha256),
    index('uploads_size_index').on(table.organisationId, table.sizeBytes),
    index('uploads_open_index').on(table.organisationId, table.projectId, table.createdBy).where(sql`${table.state} = 'open'`),
  ],
);

export const parts = pgTable(
  'parts',
  {
    id: primaryId(),
    organisationId: ofOrganisation(),
    projectId: uuid('project_id').notNull(),
    number: integer('number').notNull(),
    name: text('name').notNull(),
    createdAt: createdAt(),
    /** Deleted, with a way back for thirty days; then the worker forgets it. */
    deletedAt: at('deleted_at'),
    deletedBy: uuid('deleted_by').references(() => users.id),
  },
  (table) => [
    index('parts_deleted_index').on(table.deletedAt).where(sql`${table.deletedAt} is not null`),
    unique('parts_organisation_id_id_key').on(table.organisationId, table.id),
    unique('parts_number_key').on(table.organisationId, table.projectId, table.number),
    foreignKey({
      name: 'parts_project_fkey',
      columns: [table.organisationId, table.projectId],
      foreignColumns: [projects.organisationId, projects.id],
    }),
  ],
);

export const revisions = pgTable(
  'revisions',
  {
    id: primaryId(),
    organisationId: ofOrganisation(),
    partId: uuid('part_id').notNull(),
    /** 1, 2, 3 …, shown as A, B, C …. */
    ordinal: integer('ordinal').notNull(),
    uploadId: uuid('upload_id').notNull(),
    /** Why there is a new revision, in the words of who made it. */
    reason: text('reason').notNull().default(''),
    createdAt: createdAt(),
    createdBy: uuid('created_by').notNull(),
  },
  (table) => [
    unique('revisions_organisation_id_id_key').on(table.organisationId, table.id),
    unique('revisions_ordinal_key').on(table.organisationId, table.partId, table.ordinal),
    // One upload makes one revision, however often its completion is asked for.
    unique('revisions_upload_key').on(table.organisationId, table.uploadId),
    foreignKey({
      name: 'revisions_part_fkey',
      columns: [table.organisationId, table.partId],
      foreignColumns: [parts.organisationId, parts.id],
    }),
    foreignKey({
      name: 'revisions_upload_fkey',
      columns: [table.organisationId, table.uploadId],
      foreignColumns: [uploads.organisationId, uploads.id],
    }),
    foreignKey({
      name: 'revisions_creator_fkey',
      columns: [table.createdBy],
      foreignColumns: [users.id],
    }),
  ],
);

/** What turns a revision's measurement into a statement; `version` counts its changes. */
export const settings = pgTable(
  'settings',
  {
    revisionId: uuid('revision_id').primaryKey(),
    organisationId: ofOrganisation(),
    lengthUnit: text('length_unit').$type<NonNullable<Setting['lengthUnit']>>(),
    /** When and by whom the unit was stated for this file; null where it was taken over from the revision before. */
    unitStatedAt: at('unit_stated_at'),
    unitStatedBy: uuid('unit_stated_by').references(() => users.id),
    densityKgM3: doublePrecision('density_kg_m3'),
    densitySpreadKgM3: doublePrecision('density_spread_kg_m3'),
    /** Of the starter library, or of the organisation's own (then the text of its id); the name is that of the time of the choice. */
    materialId: text('material_id'),
    materialName: text('material_name'),
    weighedMassKg: doublePrecision('weighed_mass_kg'),
    weighedMassUncertaintyKg: doublePrecision('weighed_mass_uncertainty_kg'),
    axis: jsonb('axis').$type<Axis>().notNull(),
    driveSpeedRadPerS: doublePrecision('drive_speed_rad_per_s'),
    driveTimeS: doublePrecision('drive_time_s'),
    asMade: jsonb('as_made').$type<AsMade>(),
    shellDensities: jsonb('shell_densities').$type<ShellDensity[]>().notNull().default([]),
    version: integer('version').notNull().default(1),
    changedAt: at('changed_at').notNull().defaultNow(),
    changedBy: uuid('changed_by').notNull().references(() => users.id),
  },
  (table) => [
    foreignKey({
      name: 'settings_revision_fkey',
      columns: [table.organisationId, table.revisionId],
      foreignColumns: [revisions.organisationId, revisions.id],
    }),
    index('settings_material_index').on(table.organisationId, table.materialId),
    check('settings_density_is_positive', sql`${table.densityKgM3} > 0`),
    check('settings_material_has_a_name', sql`(${table.materialId} is null) = (${table.materialName} is null)`),
    check('settings_weighing_is_whole', sql`(${table.weighedMassKg} is null) = (${table.weighedMassUncertaintyKg} is null)`),
    check('settings_unit_stated_is_whole', sql`(${table.unitStatedAt} is null) = (${table.unitStatedBy} is null)`),
  ],
);

/** What the worker found in a file: once an organisation, file and measuring version, and never changed. */
export const measurements = pgTable(
  'measurements',
  {
    id: primaryId(),
    organisationId: ofOrganisation().references(() => organisations.id),
    sha256: bytea('sha256').notNull(),
    measuringVersion: text('measuring_version').notNull(),
    format: text('format').$type<MeshFormat>().notNull(),
    compression: text('compression').$type<MeshCompression>(),
    declaredUnit: text('declared_unit').$type<Measurement['declaredUnit']>(),
    declaredMaterials: jsonb('declared_materials').$type<string[]>().notNull().default([]),
    examined: text('examined').$type<Measurement['examined']>().notNull().default('whole'),
    facets: integer('facets').notNull(),
    origin: doublePrecision('origin').array().notNull(),
    boxMin: doublePrecision('box_min').array().notNull(),
    boxMax: doublePrecision('box_max').array().notNull(),
    /** In cubes of the mesh's own unit, as are the others in its powers; null where the mesh is not defensible. */
    volume: doublePrecision('volume'),
    volumeCentreFromOrigin: doublePrecision('volume_centre_from_origin').array(),
    /** xx, yy, zz, xy, yz, zx about the centroid, all with a plus sign. */
    volumeSecond: doublePrecision('volume_second').array(),
    /** Measuring version m1 stated none; its tests demanded 1e-13 of the volume and 1e-12 of the surface. */
    volumeErrorBound: doublePrecision('volume_error_bound').notNull().default(1e-13),
    area: doublePrecision('area').notNull(),
    areaCentreFromOrigin: doublePrecision('area_centre_from_origin').array().notNull(),
    areaSecond: doublePrecision('area_second').array().notNull(),
    areaErrorBound: doublePrecision('area_error_bound').notNull().default(1e-12),
    /** What is null was not examined, here and below. */
    closed: boolean('closed'),
    oriented: boolean('oriented').notNull(),
    outward: boolean('outward').notNull(),
    turned: boolean('turned').notNull(),
    defensible: boolean('defensible').notNull(),
    boundaryEdges: integer('boundary_edges'),
    nonManifoldEdges: integer('non_manifold_edges'),
    degenerateFacets: integer('degenerate_facets'),
    duplicateFacets: integer('duplicate_facets'),
    nonManifoldVertices: integer('non_manifold_vertices'),
    shells: integer('shells'),
    cavities: integer('cavities'),
    selfIntersections: integer('self_intersections'),
    listedShells: jsonb('listed_shells').$type<Shell[]>(),
    openings: jsonb('openings').$type<Openings>(),
    polygonVolume: doublePrecision('polygon_volume').notNull().default(0),
    facetDoubt: jsonb('facet_doubt').$type<FacetDoubt>(),
    findings: jsonb('findings').$type<Finding[]>().notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    unique('measurements_organisation_id_id_key').on(table.organisationId, table.id),
    unique('measurements_file_key').on(table.organisationId, table.sha256, table.measuringVersion),
    check('measurements_examined_is_known', sql`${table.examined} in ('integrals', 'whole', 'limited')`),
  ],
);

/**
 * How far the worker is with a revision's file. `fence` counts how often the run was taken up:
 * only the worker that took it up last may write, so one that wakes late changes nothing.
 */
export const measuringRuns = pgTable(
  'measuring_runs',
  {
    id: primaryId(),
    organisationId: ofOrganisation(),
    revisionId: uuid('revision_id').notNull(),
    state: text('state').$type<MeasuringRun['state']>().notNull().default('queued'),
    stage: text('stage').$type<MeasuringRun['stage']>().notNull().default('waiting'),
    progress: doublePrecision('progress').notNull().default(0),
    fence: integer('fence').notNull().default(0),
    /** Take-ups since the last that had an orderly end: many in a row mean that the file kills whoever reads it. */
    unendedTakeUps: integer('unended_take_ups').notNull().default(0),
    measurementId: uuid('measurement_id'),
    errorCode: text('error_code'),
    errorMessage: text('error_message'),
    errorByte: bigint('error_byte', { mode: 'number' }),
    errorLine: bigint('error_line', { mode: 'number' }),
    createdAt: createdAt(),
    startedAt: at('started_at'),
    finishedAt: at('finished_at'),
  },
  (table) => [
    unique('measuring_runs_revision_key').on(table.organisationId, table.revisionId),
    foreignKey({
      name: 'measuring_runs_revision_fkey',
      columns: [table.organisationId, table.revisionId],
      foreignColumns: [revisions.organisationId, revisions.id],
    }),
    foreignKey({
      name: 'measuring_runs_measurement_fkey',
      columns: [table.organisationId, table.measurementId],
      foreignColumns: [measurements.organisationId, measurements.id],
    }),
    check('measuring_runs_state_is_known', sql`${table.state} in ('queued', 'running', 'done', 'failed')`),
    check('measuring_runs_stage_is_known', sql`${table.stage} in ('waiting', 'hashing', 'reading', 'measuring', 'examining', 'storing')`),
    check(
      'measuring_runs_end_has_a_reason',
      sql`(${table.state} <> 'done' or ${table.measurementId} is not null) and (${table.state} <> 'failed' or ${table.measurementId} is null) and (${table.state} = 'failed') = (${table.errorCode} is not null)`,
    ),
  ],
);
