import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { Scope } from "../../shared/access.ts";
import { columns } from "./columns.ts";

/** A key of an organisation. The secret is never here: only the selector that finds the row and a hash. */
export class ApiKey extends Model<InferAttributes<ApiKey>, InferCreationAttributes<ApiKey>> {
  declare id: string;
  declare organisationId: string;
  declare name: string;
  declare selector: string;
  declare secretHash: string;
  /** Space-separated. */
  declare scopes: string;
  declare createdBy: string | null;
  declare createdAt: Date;
  declare expiresAt: Date | null;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
  declare version: CreationOptional<number>;
}

/** The scopes of a row, in the order they were granted. */
export function scopesOf(key: Pick<ApiKey, "scopes">): Scope[] {
  return key.scopes.split(" ") as Scope[];
}

export function defineApiKey(sequelize: Sequelize): typeof ApiKey {
  return class extends ApiKey {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      name: columns.text(),
      selector: columns.text(),
      secretHash: columns.text(),
      scopes: { type: DataTypes.TEXT, allowNull: false },
      createdBy: columns.optionalReference(),
      createdAt: columns.time(),
      expiresAt: columns.optionalTime(),
      lastUsedAt: columns.optionalTime(),
      revokedAt: columns.optionalTime(),
      version: columns.version(),
    },
    { sequelize, tableName: "api_keys", modelName: "apiKey", version: true },
  );
}
