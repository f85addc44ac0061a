import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** That an organisation was told of a key's end, so many days before: each notice goes out once. */
export class KeyNotice extends Model<InferAttributes<KeyNotice>, InferCreationAttributes<KeyNotice>> {
  declare keyId: string;
  declare days: number;
  declare organisationId: string;
  declare createdAt: Date;
}

export function defineKeyNotice(sequelize: Sequelize): typeof KeyNotice {
  return class extends KeyNotice {}.init(
    {
      keyId: columns.id(),
      days: { type: DataTypes.INTEGER, primaryKey: true },
      organisationId: columns.organisationId(),
      createdAt: columns.time(),
    },
    { sequelize, tableName: "key_notices", modelName: "keyNotice" },
  );
}
