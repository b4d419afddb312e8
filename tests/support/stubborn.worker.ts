import { answerQuestions } from '../../server/workers/answer.ts';

export type Order = { readonly kind: 'echo'; readonly text: string } | { readonly kind: 'hang' | 'hoard' | 'throw' };

/** Does as it is told, the worst of it too. */
answerQuestions<Order, string>((order) => {
  switch (order.kind) {
    case 'echo':
      return order.text;
    case 'throw':
      throw new RangeError('told to');
    case 'hang':
      for (;;);
    case 'hoard': {
      const hoard: number[][] = [];
      for (;;) hoard.push(Array.from({ length: 100_000 }, (_, n) => n + Math.random()));
    }
  }
});
