import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** How one attempt at a delivery ended. The reply is kept to 1 kB, and of a test not at all. */
export class WebhookAttempt extends Model<
  InferAttributes<WebhookAttempt>,
  InferCreationAttributes<WebhookAttempt>
> {
  declare deliveryId: string;
  declare attempt: number;
  declare organisationId: string;
  declare at: Date;
  declare status: number | null;
  declare durationMs: number;
  declare error: "timeout" | "target_refused" | "connection_failed" | null;
  declare detail: string | null;
  declare replyText: string | null;
}

export function defineWebhookAttempt(sequelize: Sequelize): typeof WebhookAttempt {
  return class extends WebhookAttempt {}.init(
    {
      deliveryId: columns.id(),
      attempt: { type: DataTypes.INTEGER, primaryKey: true },
      organisationId: columns.organisationId(),
      at: columns.time(),
      status: { type: DataTypes.INTEGER, allowNull: true },
      durationMs: { type: DataTypes.DOUBLE, allowNull: false },
      error: columns.optionalText(),
      detail: columns.optionalText(),
      replyText: { type: DataTypes.STRING(1024), allowNull: true },
    },
    { sequelize, tableName: "webhook_attempts", modelName: "webhookAttempt" },
  );
}
