import { DataTypes } from "sequelize";

/** The column types that several tables share. Functions, because the ORM writes the column's name into what it is given. */
export const columns = {
  id: () => ({ type: DataTypes.CHAR(36), primaryKey: true }),
  organisationId: () => ({ type: DataTypes.CHAR(36), allowNull: false }),
  reference: () => ({ type: DataTypes.CHAR(36), allowNull: false }),
  optionalReference: () => ({ type: DataTypes.CHAR(36), allowNull: true }),
  time: () => ({ type: DataTypes.DATE(3), allowNull: false }),
  optionalTime: () => ({ type: DataTypes.DATE(3), allowNull: true }),
  text: () => ({ type: DataTypes.STRING, allowNull: false }),
  optionalText: () => ({ type: DataTypes.STRING, allowNull: true }),
  version: () => ({ type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 }),
};
