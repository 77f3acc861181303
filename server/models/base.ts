/** What every table has, and how a model class is bound to one connection. */
import { DataTypes, type InitOptions, type Model, type ModelAttributes, type Sequelize } from 'sequelize';

/** Primary key; made by the server, so that a row's id is known before it is written. */
export const idColumn = { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true } as const;

type ModelClass = (new () => Model) & Omit<typeof Model, never>;

/**
 * Binds `model` to `sequelize` through a subclass of its own, so that two servers in one process
 * (tests, scripts) never share a connection by accident.
 */
export function bind<M extends ModelClass>(
  model: M,
  sequelize: Sequelize,
  tableName: string,
  columns: ModelAttributes<InstanceType<M>>,
  options: Partial<InitOptions> = {},
): M {
  const Base: ModelClass = model;
  class Bound extends Base {}
  const settings = {
    sequelize,
    tableName,
    modelName: tableName,
    underscored: true,
    updatedAt: false,
    ...options,
  };
  Bound.init(columns as ModelAttributes, settings);
  return Bound as unknown as M;
}
