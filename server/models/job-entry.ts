import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { JobEntryKind } from "../jobs/job-log.ts";
import { columns } from "./columns.ts";

/** One thing that happened in a job. Rows are added and never change. */
export class JobEntryRow extends Model<InferAttributes<JobEntryRow>, InferCreationAttributes<JobEntryRow>> {
  declare jobId: string;
  declare revision: number;
  declare sequence: number;
  declare id: string;
  declare organisationId: string;
  declare kind: JobEntryKind;
  declare documentText: string;
  declare createdAt: Date;
  declare memberId: string | null;
  declare keyId: string | null;
  /** The member's or key's name when the entry was made: renamed later, it changes no record. */
  declare authorName: string;
  /** Its number among the job's events; null in the log of a later revision that began as a copy. */
  declare event: number | null;
}

export function defineJobEntry(sequelize: Sequelize): typeof JobEntryRow {
  const part = () => ({ type: DataTypes.INTEGER, allowNull: false, primaryKey: true });
  return class extends JobEntryRow {}.init(
    {
      jobId: { ...columns.reference(), primaryKey: true },
      revision: part(),
      sequence: part(),
      id: columns.reference(),
      organisationId: columns.organisationId(),
      kind: columns.text(),
      documentText: { type: DataTypes.TEXT("long"), allowNull: false },
      createdAt: columns.time(),
      memberId: columns.optionalReference(),
      keyId: columns.optionalReference(),
      authorName: columns.text(),
      event: { type: DataTypes.INTEGER, allowNull: true },
    },
    { sequelize, tableName: "job_entries", modelName: "jobEntry" },
  );
}
