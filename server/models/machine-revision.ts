import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** What a machine was at one time. Rows never change. */
export class MachineRevision extends Model<
  InferAttributes<MachineRevision>,
  InferCreationAttributes<MachineRevision>
> {
  declare id: string;
  declare organisationId: string;
  declare machineId: string;
  declare revision: number;
  declare documentText: string;
  declare documentHash: string;
  declare reason: string;
  declare memberId: string | null;
  declare keyId: string | null;
  declare createdAt: Date;
}

export function defineMachineRevision(sequelize: Sequelize): typeof MachineRevision {
  return class extends MachineRevision {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      machineId: columns.reference(),
      revision: { type: DataTypes.INTEGER, allowNull: false },
      documentText: { type: DataTypes.TEXT("long"), allowNull: false },
      documentHash: columns.text(),
      reason: { type: DataTypes.TEXT, allowNull: false },
      memberId: columns.optionalReference(),
      keyId: columns.optionalReference(),
      createdAt: columns.time(),
    },
    { sequelize, tableName: "machine_revisions", modelName: "machineRevision" },
  );
}
