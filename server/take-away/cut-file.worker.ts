import { answerQuestions } from '../workers/answer.ts';
import { cutFile, type FileAnswer, type FileAsked } from './file.ts';

answerQuestions<FileAsked, FileAnswer>(cutFile);
