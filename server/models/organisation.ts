import {
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** Everything belongs to one organisation, and none sees another's. */
export class Organisation extends Model<
  InferAttributes<Organisation>,
  InferCreationAttributes<Organisation>
> {
  declare id: string;
  declare name: string;
  declare createdAt: CreationOptional<Date>;
}

export function defineOrganisation(sequelize: Sequelize): typeof Organisation {
  return class extends Organisation {}.init(
    { id: columns.id(), name: columns.text(), createdAt: columns.time() },
    { sequelize, tableName: "organisations", modelName: "organisation" },
  );
}
