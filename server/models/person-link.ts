import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A mailed single-use link: invitation, reset, or the first administrator. */
export class PersonLink extends Model<
  InferAttributes<PersonLink>,
  InferCreationAttributes<PersonLink>
> {
  declare id: CreationOptional<string>;
  declare personId: CreationOptional<string | null>;
  declare purpose: 'invitation' | 'reset' | 'first_administrator';
  declare tokenHash: string;
  declare mailId: CreationOptional<string | null>;
  declare expiresAt: Date;
  declare usedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;

  static initialise(sequelize: Sequelize) {
    PersonLink.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        personId: DataTypes.UUID,
        purpose: { type: DataTypes.TEXT, allowNull: false },
        tokenHash: { type: DataTypes.TEXT, allowNull: false },
        mailId: DataTypes.UUID,
        expiresAt: { type: DataTypes.DATE(3), allowNull: false },
        usedAt: DataTypes.DATE(3),
        createdAt: { type: DataTypes.DATE(3), allowNull: true },
      },
      { sequelize, tableName: 'person_links' },
    );
  }
}
