import bcrypt from 'bcryptjs';
import { answerQuestions } from '../workers/answer.ts';
import type { PasswordAnswer, PasswordQuestion } from './passwords.ts';

answerQuestions<PasswordQuestion, PasswordAnswer>((question) =>
  question.kind === 'hash'
    ? { hash: bcrypt.hashSync(question.password, question.cost), matches: false }
    : { hash: '', matches: bcrypt.compareSync(question.password, question.hash) },
);
