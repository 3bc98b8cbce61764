import { DataTypes, type ModelAttributeColumnOptions } from 'sequelize';
import { v7 as uuidV7 } from 'uuid';

/** Column definitions that many models share. A definition is a function: Sequelize writes into what it is given. */

const MILLISECOND_DIGITS = 3;

/** A UUID of version 7, so that keys grow with time and pages of an index stay together. */
export const idColumn = () =>
  ({ type: DataTypes.CHAR(36), primaryKey: true, defaultValue: () => uuidV7() }) satisfies ModelAttributeColumnOptions;

export const referenceColumn = () =>
  ({ type: DataTypes.CHAR(36), allowNull: false }) satisfies ModelAttributeColumnOptions;

export const optionalReferenceColumn = () =>
  ({ type: DataTypes.CHAR(36), allowNull: true, defaultValue: null }) satisfies ModelAttributeColumnOptions;

export const timeColumn = () => DataTypes.DATE(MILLISECOND_DIGITS);

export const optionalTimeColumn = () =>
  ({ type: timeColumn(), allowNull: true, defaultValue: null }) satisfies ModelAttributeColumnOptions;

export const optionalNumberColumn = () =>
  ({ type: DataTypes.DOUBLE, allowNull: true, defaultValue: null }) satisfies ModelAttributeColumnOptions;

export const optionalTextColumn = () =>
  ({ type: DataTypes.TEXT, allowNull: true, defaultValue: null }) satisfies ModelAttributeColumnOptions;

/** BINARY columns arrive as Buffer; Sequelize has no narrower type for them. */
export const binaryColumn = () => ({ type: DataTypes.BLOB, allowNull: false }) satisfies ModelAttributeColumnOptions;

export const optionalBinaryColumn = () =>
  ({ type: DataTypes.BLOB, allowNull: true, defaultValue: null }) satisfies ModelAttributeColumnOptions;
