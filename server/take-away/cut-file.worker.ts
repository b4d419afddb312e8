import { answerQuestions } from '../workers/answer.ts';
import { cutFile, type FileAnswer, type FileAsked } from './file.ts';
import { shownPath, type PathAnswer, type PathAsked } from './shown-path.ts';

answerQuestions<FileAsked | PathAsked, FileAnswer | PathAnswer>((asked) =>
  asked.as === 'path' ? { kind: 'path', path: shownPath(asked.taken) } : cutFile(asked),
);
