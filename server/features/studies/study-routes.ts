import type { Handler } from '../../http/handler.ts';
import { createStudyCommand } from './create-study.ts';
import { editChainCommand } from './edit-chain.ts';
import { addMemberCommand, removeMemberCommand } from './members.ts';
import { getStudyQuery, listStudiesQuery } from './read-studies.ts';
import { saveLayoutHandler } from './save-layout.ts';

export const studyRoutes: Handler[] = [
  listStudiesQuery,
  createStudyCommand,
  getStudyQuery,
  editChainCommand,
  saveLayoutHandler,
  addMemberCommand,
  removeMemberCommand,
];
