import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { WebhookEventType } from "../../shared/schemas/webhooks.ts";
import { columns } from "./columns.ts";

/** Where an organisation wants to be told of what happens. Its signing secret is sealed, never in plain. */
export class WebhookEndpoint extends Model<
  InferAttributes<WebhookEndpoint>,
  InferCreationAttributes<WebhookEndpoint>
> {
  declare id: string;
  declare organisationId: string;
  declare name: string;
  declare url: string;
  /** Space-separated. */
  declare events: string;
  declare active: boolean;
  /** Why the service switched it off by itself; null while it is on, or when a person did. */
  declare stopReason: CreationOptional<"gone" | "failing" | null>;
  declare stoppedAt: CreationOptional<Date | null>;
  /** The first failure since the last delivery that arrived. */
  declare failingSince: CreationOptional<Date | null>;
  declare secretSealed: string;
  declare previousSecretSealed: CreationOptional<string | null>;
  declare previousSecretUntil: CreationOptional<Date | null>;
  declare createdAt: Date;
  declare version: CreationOptional<number>;
}

export function eventsOf({ events }: Pick<WebhookEndpoint, "events">): WebhookEventType[] {
  return events.split(" ") as WebhookEventType[];
}

export function defineWebhookEndpoint(sequelize: Sequelize): typeof WebhookEndpoint {
  return class extends WebhookEndpoint {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      name: columns.text(),
      url: { type: DataTypes.STRING(2000), allowNull: false },
      events: { type: DataTypes.TEXT, allowNull: false },
      active: { type: DataTypes.BOOLEAN, allowNull: false },
      stopReason: columns.optionalText(),
      stoppedAt: columns.optionalTime(),
      failingSince: columns.optionalTime(),
      secretSealed: { type: DataTypes.TEXT, allowNull: false },
      previousSecretSealed: { type: DataTypes.TEXT, allowNull: true },
      previousSecretUntil: columns.optionalTime(),
      createdAt: columns.time(),
      version: columns.version(),
    },
    { sequelize, tableName: "webhook_endpoints", modelName: "webhookEndpoint", version: true },
  );
}
