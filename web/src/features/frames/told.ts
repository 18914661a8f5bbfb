import { ApiProblem } from '../../lib/api.ts';
import { showNotice } from '../../ui/notices.tsx';

/** Does it, and shows the reason in a notice where it was refused. Never rejects. */
export async function told(act: () => Promise<void>): Promise<void> {
  try {
    await act();
  } catch (error) {
    showNotice(error instanceof ApiProblem ? error.detail : 'That did not work. Please try again.', { tone: 'problem' });
  }
}
