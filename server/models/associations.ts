import type { Model, ModelStatic } from 'sequelize';
import type { Models } from './database';
import { resourceNames } from '../../shared/contracts/resources';
import { childNames } from './fields';
import { childLists } from './tables';

/** Who belongs to whom, in one place. The foreign keys themselves stand in the migrations. */
export function associate(models: Models): void {
  const { users, sessions, productions, members, invitations, links, history, plans, versions, calls, confirmations } = models;
  users.hasMany(sessions, { foreignKey: 'userId' });
  sessions.belongsTo(users, { foreignKey: 'userId', as: 'user' });

  const owned: ModelStatic<Model>[] = [members, invitations, links, history, plans, versions, calls, confirmations];
  for (const model of owned) model.belongsTo(productions, { foreignKey: 'productionId', as: 'production' });
  members.belongsTo(users, { foreignKey: 'userId', as: 'user' });
  productions.hasMany(members, { foreignKey: 'productionId', as: 'members' });
  const ofPeople: ModelStatic<Model>[] = [members, invitations, links, calls];
  for (const model of ofPeople) model.belongsTo(models.rows.people, { foreignKey: 'personId', as: 'person' });
  versions.belongsTo(plans, { foreignKey: 'planId', as: 'plan' });
  versions.hasMany(calls, { foreignKey: 'versionId', as: 'calls' });
  calls.hasOne(confirmations, { foreignKey: 'callId', as: 'confirmation' });

  for (const name of resourceNames)
    if (name !== 'production') models.rows[name].belongsTo(productions, { foreignKey: 'productionId', as: 'production' });
  models.rows.parts.belongsTo(models.rows.songs, { foreignKey: 'songId', as: 'ownSong' });
  for (const name of childNames)
    for (const foreignKey of new Set(childLists[name].map((list) => list.owner)))
      models.entries[name].belongsTo(ownerOf(models, foreignKey), { foreignKey, as: `${foreignKey.replace(/Id$/, '')}Owner` });

  const { setupContents, takes, checklists, checklistItems, questions, answers } = models;
  setupContents.belongsTo(models.rows.setups, { foreignKey: 'setupId', as: 'setup' });
  takes.belongsTo(models.rows.songs, { foreignKey: 'songId', as: 'song' });
  takes.belongsTo(models.rows.passes, { foreignKey: 'passId', as: 'pass' });
  checklists.hasMany(checklistItems, { foreignKey: 'checklistId', as: 'items' });
  questions.hasMany(answers, { foreignKey: 'questionId', as: 'answers' });
}

function ownerOf(models: Models, foreignKey: string) {
  const { rooms, people, gear, setups, events, parts, passes } = models.rows;
  const owners = new Map([
    ['roomId', rooms],
    ['personId', people],
    ['gearId', gear],
    ['setupId', setups],
    ['eventId', events],
    ['partId', parts],
    ['passId', passes],
  ]);
  const owner = owners.get(foreignKey);
  if (!owner) throw new Error(`no row owns entries by ${foreignKey}`);
  return owner;
}
