import { DataTypes, type Sequelize } from 'sequelize';
import { columns, createdAt, id, large, maybeMoment, maybeUuid, maybeWhole, maybeWords, moment, uuid, whole, words } from './columns';

/** Set-up contents, takes, checklists, questions and attachments. */
export function preparationModels(sequelize: Sequelize) {
  const plain = { timestamps: false };
  const productionId = uuid;
  return {
    setupContents: sequelize.define(
      'setupContent',
      columns({
        id,
        productionId,
        setupId: uuid,
        position: whole,
        kind: words,
        label: words,
        count: whole,
        details: { type: DataTypes.JSONB, allowNull: false, defaultValue: {} },
      }),
      { tableName: 'setup_contents', ...plain },
    ),
    takes: sequelize.define(
      'take',
      columns({
        id,
        productionId,
        songId: uuid,
        partId: maybeUuid,
        passId: maybeUuid,
        number: whole,
        startedAt: words,
        seconds: maybeWhole,
        ending: words,
        mark: maybeWords,
        approvedBy: maybeUuid,
        comment: maybeWords,
        fileName: maybeWords,
        createdAt,
      }),
      { tableName: 'takes', ...plain },
    ),
    checklists: sequelize.define('checklist', columns({ id, productionId, title: words, position: whole, createdAt }), {
      tableName: 'checklists',
      ...plain,
    }),
    checklistItems: sequelize.define(
      'checklistItem',
      columns({
        id,
        productionId,
        checklistId: uuid,
        ownerPersonId: maybeUuid,
        position: whole,
        says: words,
        due: maybeWords,
        proof: maybeWords,
        doneAt: maybeMoment,
      }),
      { tableName: 'checklist_items', ...plain },
    ),
    questions: sequelize.define('question', columns({ id, productionId, personId: maybeUuid, asks: words, due: maybeWords, createdAt }), {
      tableName: 'questions',
      ...plain,
    }),
    answers: sequelize.define('answer', columns({ id, productionId, questionId: uuid, personId: uuid, says: words, at: moment }), {
      tableName: 'answers',
      ...plain,
    }),
    attachments: sequelize.define(
      'attachment',
      columns({
        id,
        productionId,
        resource: words,
        resourceId: uuid,
        fileName: words,
        mediaType: words,
        bytes: large,
        sha256: words,
        content: { type: DataTypes.BLOB, allowNull: true },
        storedAt: maybeWords,
        uploadedBy: uuid,
        createdAt,
      }),
      { tableName: 'attachments', ...plain },
    ),
  };
}
