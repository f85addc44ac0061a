import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** A job on one revision of a machine. What happened in it stands in its entries; `version` rises with each. */
export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: string;
  declare organisationId: string;
  declare machineId: string;
  declare machineRevision: number;
  declare title: string;
  declare revision: number;
  declare state: "open" | "signed";
  declare signedAt: CreationOptional<Date | null>;
  declare createdAt: Date;
  declare version: CreationOptional<number>;
  /** How many events it has had: entries and indications, numbered from 1. */
  declare events: CreationOptional<number>;
}

export function defineJob(sequelize: Sequelize): typeof Job {
  return class extends Job {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      machineId: columns.reference(),
      machineRevision: { type: DataTypes.INTEGER, allowNull: false },
      title: columns.text(),
      revision: { type: DataTypes.INTEGER, allowNull: false },
      state: columns.text(),
      signedAt: columns.optionalTime(),
      createdAt: columns.time(),
      version: columns.version(),
      events: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    },
    { sequelize, tableName: "jobs", modelName: "job" },
  );
}
