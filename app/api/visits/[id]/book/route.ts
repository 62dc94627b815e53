import { bookVisit } from '@/lib/schedule/book-visit';
import { bookVisitInput } from '@/lib/schedule/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'visit.book', summary: 'Book a visit', input: bookVisitInput, change: true, run: bookVisit });
