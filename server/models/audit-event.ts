import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** What changed in keys, members and sessions, and by whom: written in the change's own transaction, never altered. */
export class AuditEvent extends Model<InferAttributes<AuditEvent>, InferCreationAttributes<AuditEvent>> {
  declare createdAt: Date;
  declare id: string;
  declare organisationId: string;
  declare memberId: string | null;
  declare keyId: string | null;
  declare action: string;
  declare subject: string;
  declare details: string;
  declare requestId: string | null;
}

export function defineAuditEvent(sequelize: Sequelize): typeof AuditEvent {
  return class extends AuditEvent {}.init(
    {
      createdAt: { ...columns.time(), primaryKey: true },
      id: columns.id(),
      organisationId: columns.organisationId(),
      memberId: columns.optionalReference(),
      keyId: columns.optionalReference(),
      action: columns.text(),
      subject: columns.reference(),
      details: { type: DataTypes.TEXT, allowNull: false },
      requestId: columns.optionalText(),
    },
    { sequelize, tableName: "audit_events", modelName: "auditEvent" },
  );
}
