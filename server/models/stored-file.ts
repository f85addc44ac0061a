import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { columns } from "./columns.ts";

/** A file as it was sent. Rows never change. */
export class StoredFile extends Model<InferAttributes<StoredFile>, InferCreationAttributes<StoredFile>> {
  declare id: string;
  declare organisationId: string;
  declare name: string;
  declare mediaType: string;
  declare bytes: number;
  declare sha256: string;
  declare createdAt: Date;
}

/** A stretch of a file: all of them in order are the file. */
export class StoredFilePart extends Model<
  InferAttributes<StoredFilePart>,
  InferCreationAttributes<StoredFilePart>
> {
  declare fileId: string;
  declare sequence: number;
  declare content: Buffer;
}

export function defineStoredFile(sequelize: Sequelize): typeof StoredFile {
  return class extends StoredFile {}.init(
    {
      id: columns.id(),
      organisationId: columns.organisationId(),
      name: columns.text(),
      mediaType: columns.text(),
      bytes: { type: DataTypes.INTEGER, allowNull: false },
      sha256: columns.text(),
      createdAt: columns.time(),
    },
    { sequelize, tableName: "stored_files", modelName: "storedFile" },
  );
}

export function defineStoredFilePart(sequelize: Sequelize): typeof StoredFilePart {
  return class extends StoredFilePart {}.init(
    {
      fileId: { ...columns.reference(), primaryKey: true },
      sequence: { type: DataTypes.INTEGER, allowNull: false, primaryKey: true },
      content: { type: DataTypes.BLOB("medium"), allowNull: false },
    },
    { sequelize, tableName: "stored_file_parts", modelName: "storedFilePart" },
  );
}
