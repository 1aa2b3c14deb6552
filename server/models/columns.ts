import { DataTypes, type Model, type ModelAttributeColumnOptions } from 'sequelize';

// eslint-disable-next-line @typescript-eslint/no-explicit-any -- rows of JSON columns carry the type of their writer; readers parse them
export type JsonValue = any;

/**
 * A BIGINT of minor units. The driver answers a number that it has checked for safety; from the model on it is a `bigint`,
 * so that nothing adds money as floats.
 */
export function minorColumn(
  name: string,
  { allowNull }: { allowNull: boolean },
): ModelAttributeColumnOptions {
  return {
    type: DataTypes.BIGINT,
    allowNull,
    get(this: Model): bigint | null {
      const raw = this.getDataValue(name as never) as unknown as number | bigint | string | null | undefined;
      return raw === null || raw === undefined ? null : BigInt(raw);
    },
  };
}
