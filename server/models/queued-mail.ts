import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** A mail of the service's own, written in the transaction of what it tells of and sent afterwards. */
export class QueuedMail extends Model<InferAttributes<QueuedMail>, InferCreationAttributes<QueuedMail>> {
  declare id: string;
  declare organisationId: string;
  /** E-mail addresses, one a line. */
  declare recipients: string;
  declare subject: string;
  declare text: string;
  declare state: "pending" | "sent" | "failed";
  declare tries: CreationOptional<number>;
  declare nextAttemptAt: Date | null;
  declare leaseToken: CreationOptional<string | null>;
  declare createdAt: Date;
}

export function defineQueuedMail(sequelize: Sequelize): typeof QueuedMail {
  return class extends QueuedMail {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      recipients: { type: DataTypes.TEXT, allowNull: false },
      subject: columns.text(),
      text: { type: DataTypes.TEXT, allowNull: false },
      state: columns.text(),
      tries: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      nextAttemptAt: columns.optionalTime(),
      leaseToken: columns.optionalReference(),
      createdAt: columns.time(),
    },
    { sequelize, tableName: "queued_mails", modelName: "queuedMail" },
  );
}
