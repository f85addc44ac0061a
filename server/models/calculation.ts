import { DataTypes, Model, type InferAttributes, type Sequelize } from "sequelize";
import type { CalculationKindName } from "../calculations/calculation-kind.ts";
import { columns } from "./columns.ts";

/** A stored calculation, read only: rows are written by services/write-records.ts alone and never change. */
export class Calculation extends Model<InferAttributes<Calculation>, never> {
  declare readonly createdAt: Date;
  declare readonly id: string;
  declare readonly organisationId: string;
  declare readonly kind: CalculationKindName;
  declare readonly status: "succeeded" | "failed";
  declare readonly engineVersion: string;
  declare readonly durationMs: number;
  /** The body as received. */
  declare readonly requestText: string;
  /** The body in RFC 8785 form: what inputHash is over. */
  declare readonly requestCanonical: string;
  declare readonly inputHash: string;
  /** The answer, or the problem of a refusal, as sent. */
  declare readonly answerText: string;
  declare readonly resultHash: string | null;
  declare readonly memberId: string | null;
  declare readonly keyId: string | null;
  declare readonly requestId: string;
  declare readonly note: string | null;
  declare readonly jobId: string | null;
}

export function defineCalculation(sequelize: Sequelize): typeof Calculation {
  const longText = () => ({ type: DataTypes.TEXT("long"), allowNull: false });
  return class extends Calculation {}.init(
    {
      createdAt: { ...columns.time(), primaryKey: true },
      id: columns.id(),
      organisationId: columns.organisationId(),
      kind: columns.text(),
      status: columns.text(),
      engineVersion: columns.text(),
      durationMs: { type: DataTypes.DOUBLE, allowNull: false },
      requestText: longText(),
      requestCanonical: longText(),
      inputHash: columns.text(),
      answerText: longText(),
      resultHash: columns.optionalText(),
      memberId: columns.optionalReference(),
      keyId: columns.optionalReference(),
      requestId: columns.text(),
      note: { type: DataTypes.TEXT, allowNull: true },
      jobId: columns.optionalReference(),
    },
    { sequelize, tableName: "calculations", modelName: "calculation" },
  );
}
