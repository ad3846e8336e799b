import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

import type { CommentPin } from '@/contract/comments';

/** A comment on a preset. The first of a thread has no `threadId` and says where the thread stands. */
export interface Comment extends Model<InferAttributes<Comment>, InferCreationAttributes<Comment>> {
  id: string;
  presetId: string;
  threadId: string | null;
  revision: CreationOptional<number>;
  authorId: string;
  authorName: string;
  text: string;
  version: number | null;
  pin: CommentPin | null;
  createdAt: Date;
  editedAt: CreationOptional<Date | null>;
  deletedAt: CreationOptional<Date | null>;
  resolvedAt: CreationOptional<Date | null>;
  resolvedByName: CreationOptional<string | null>;
}

export function defineComment(sequelize: Sequelize) {
  return sequelize.define<Comment>(
    'Comment',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      presetId: { type: DataTypes.STRING, allowNull: false },
      threadId: { type: DataTypes.STRING },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      authorId: { type: DataTypes.STRING, allowNull: false },
      authorName: { type: DataTypes.STRING, allowNull: false },
      text: { type: DataTypes.TEXT, allowNull: false },
      version: { type: DataTypes.INTEGER },
      pin: { type: DataTypes.JSON },
      createdAt: { type: DataTypes.DATE, allowNull: false },
      editedAt: { type: DataTypes.DATE },
      deletedAt: { type: DataTypes.DATE },
      resolvedAt: { type: DataTypes.DATE },
      resolvedByName: { type: DataTypes.STRING },
    },
    { tableName: 'comments', timestamps: false },
  );
}
