import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/**
 * One message to one endpoint. pending: due at nextAttemptAt, which is the end of the lease while it is being sent.
 * paused: came due while its endpoint was off.
 */
export class WebhookDelivery extends Model<
  InferAttributes<WebhookDelivery>,
  InferCreationAttributes<WebhookDelivery>
> {
  declare id: string;
  declare organisationId: string;
  declare endpointId: string;
  declare type: string;
  declare payloadText: string;
  declare state: "pending" | "delivered" | "failed" | "paused";
  /** All attempts that were made. */
  declare attempts: CreationOptional<number>;
  /** Attempts since it was made, or asked for again: where it stands in the schedule. */
  declare tries: CreationOptional<number>;
  declare nextAttemptAt: Date | null;
  declare leaseToken: CreationOptional<string | null>;
  declare createdAt: Date;
}

export function defineWebhookDelivery(sequelize: Sequelize): typeof WebhookDelivery {
  return class extends WebhookDelivery {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      endpointId: columns.reference(),
      type: columns.text(),
      payloadText: { type: DataTypes.TEXT, allowNull: false },
      state: columns.text(),
      attempts: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      tries: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      nextAttemptAt: columns.optionalTime(),
      leaseToken: columns.optionalReference(),
      createdAt: columns.time(),
    },
    { sequelize, tableName: "webhook_deliveries", modelName: "webhookDelivery" },
  );
}
