import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** A member signed in at one browser. The refresh secret rotates; the one before is kept for the grace of two tabs. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: string;
  declare organisationId: string;
  declare memberId: string;
  declare refreshHash: string;
  declare previousHash: CreationOptional<string | null>;
  declare rotatedAt: Date;
  declare createdAt: Date;
  declare expiresAt: Date;
  declare endedAt: CreationOptional<Date | null>;
}

export function defineSession(sequelize: Sequelize): typeof Session {
  return class extends Session {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      memberId: columns.reference(),
      refreshHash: columns.text(),
      previousHash: columns.optionalText(),
      rotatedAt: columns.time(),
      createdAt: columns.time(),
      expiresAt: columns.time(),
      endedAt: columns.optionalTime(),
    },
    { sequelize, tableName: "sessions", modelName: "session" },
  );
}
