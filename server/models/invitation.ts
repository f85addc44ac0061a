import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** A one-time link by which a member sets a password. Only the token's hash is kept. */
export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: string;
  declare organisationId: string;
  declare memberId: string;
  declare tokenHash: string;
  declare createdAt: Date;
  declare expiresAt: Date;
  declare usedAt: CreationOptional<Date | null>;
}

export function defineInvitation(sequelize: Sequelize): typeof Invitation {
  return class extends Invitation {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      memberId: columns.reference(),
      tokenHash: columns.text(),
      createdAt: columns.time(),
      expiresAt: columns.time(),
      usedAt: columns.optionalTime(),
    },
    { sequelize, tableName: "invitations", modelName: "invitation" },
  );
}
