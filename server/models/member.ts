import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { Role } from "../../shared/access.ts";
import { columns } from "./columns.ts";

/** A person of an organisation. Without a password hash they are invited and cannot sign in yet. */
export class Member extends Model<InferAttributes<Member>, InferCreationAttributes<Member>> {
  declare id: string;
  declare organisationId: string;
  declare email: string;
  declare name: string;
  declare role: Role;
  declare passwordHash: CreationOptional<string | null>;
  declare disabledAt: CreationOptional<Date | null>;
  declare lastSignedInAt: CreationOptional<Date | null>;
  declare version: CreationOptional<number>;
  declare createdAt: Date;
}

export function defineMember(sequelize: Sequelize): typeof Member {
  return class extends Member {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      email: columns.text(),
      name: columns.text(),
      role: columns.text(),
      passwordHash: columns.optionalText(),
      disabledAt: columns.optionalTime(),
      lastSignedInAt: columns.optionalTime(),
      version: columns.version(),
      createdAt: columns.time(),
    },
    { sequelize, tableName: "members", modelName: "member", version: true },
  );
}
