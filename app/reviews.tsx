import { ReviewsScreen } from '@/components/reviews/reviews-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Reviews() {
  return (
    <Route title={titles.reviews} action="review.read">
      <ReviewsScreen />
    </Route>
  );
}
