import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** A machine of an organisation: what it is stands in its revisions, `revision` is the newest. */
export class Machine extends Model<InferAttributes<Machine>, InferCreationAttributes<Machine>> {
  declare id: string;
  declare organisationId: string;
  declare name: string;
  declare plantTag: string | null;
  declare revision: number;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: Date;
  declare version: CreationOptional<number>;
}

export function defineMachine(sequelize: Sequelize): typeof Machine {
  return class extends Machine {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      name: columns.text(),
      plantTag: columns.optionalText(),
      revision: { type: DataTypes.INTEGER, allowNull: false },
      archivedAt: columns.optionalTime(),
      createdAt: columns.time(),
      version: columns.version(),
    },
    { sequelize, tableName: "machines", modelName: "machine", version: true },
  );
}
