import { ApiProblem } from '@/components/data/problem.ts';

export const problemOfFields = (errors: { pointer: string; detail: string }[]): ApiProblem =>
  new ApiProblem({
    code: 'invalid-fields',
    status: 400,
    title: 'Some fields are not right',
    detail: 'Look at the fields.',
    errors,
  });
