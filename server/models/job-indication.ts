import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** What was read at one moment of a move, and what was answered. */
export class JobIndication extends Model<
  InferAttributes<JobIndication>,
  InferCreationAttributes<JobIndication>
> {
  declare jobId: string;
  declare id: string;
  declare organisationId: string;
  declare requestText: string;
  declare answerText: string;
  declare createdAt: Date;
  declare memberId: string | null;
  declare keyId: string | null;
  /** Its number among the job's events. */
  declare event: number;
}

export function defineJobIndication(sequelize: Sequelize): typeof JobIndication {
  return class extends JobIndication {}.init(
    {
      jobId: { ...columns.reference(), primaryKey: true },
      id: columns.id(),
      organisationId: columns.organisationId(),
      requestText: { type: DataTypes.TEXT("long"), allowNull: false },
      answerText: { type: DataTypes.TEXT("long"), allowNull: false },
      createdAt: columns.time(),
      memberId: columns.optionalReference(),
      keyId: columns.optionalReference(),
      event: { type: DataTypes.INTEGER, allowNull: false },
    },
    { sequelize, tableName: "job_indications", modelName: "jobIndication" },
  );
}
