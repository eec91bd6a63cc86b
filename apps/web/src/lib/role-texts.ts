import type { Role } from '@masswright/contracts';

/** What each role is called and what it means, in one place. */
export const roleTexts: Record<Role, { name: string; withArticle: string; may: string }> = {
  administrator: { name: 'Administrator', withArticle: 'an administrator', may: 'you invite people and do all that the others do.' },
  engineer: { name: 'Engineer', withArticle: 'an engineer', may: 'you make projects, add meshes and set how they are read.' },
  reviewer: { name: 'Reviewer', withArticle: 'a reviewer', may: 'you read everything and sign what is submitted.' },
  reader: { name: 'Reader', withArticle: 'a reader', may: 'you read everything and change nothing.' },
};
