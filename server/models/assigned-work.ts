import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

/** Work in progress on an assigned sweep, as it was last saved. */
export interface AssignedWork extends Model<
  InferAttributes<AssignedWork>,
  InferCreationAttributes<AssignedWork>
> {
  assignedId: string;
  userId: string;
  revision: number;
  /** Document, range, findings and runs as JSON. */
  content: string;
  /** How many runs are in it. */
  runs: number;
  savedAt: Date;
}

export function defineAssignedWork(sequelize: Sequelize) {
  return sequelize.define<AssignedWork>(
    'AssignedWork',
    {
      assignedId: { type: DataTypes.STRING, primaryKey: true },
      userId: { type: DataTypes.STRING, primaryKey: true },
      revision: { type: DataTypes.INTEGER, allowNull: false },
      content: { type: DataTypes.TEXT, allowNull: false },
      runs: { type: DataTypes.INTEGER, allowNull: false },
      savedAt: { type: DataTypes.DATE, allowNull: false },
    },
    { tableName: 'assigned_work', timestamps: false },
  );
}
