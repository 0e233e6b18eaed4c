import { change, inTransaction, select } from '../database/connection';
import type { Context } from '../context';
import { Problem } from '../http/problem';
import { announce } from '../live/announce';

/**
 * Moves the business clock of a rehearsal forward to an instant (epoch milliseconds). Days that have begun are not
 * unlived: backward is refused.
 * @throws Problem 422.
 */
export async function moveClock(context: Context, to: number): Promise<void> {
  const { db, clock, settings } = context;
  if (!settings.rehearsal)
    throw new Problem(409, 'no-rehearsal', 'The clock moves in rehearsal only.');
  await inTransaction(db, async (transaction) => {
    await change(db, 'INSERT IGNORE INTO clock (id, offset_ms) VALUES (1, 0)', {}, transaction);
    const [row] = await select<{ offset_ms: number }>(
      db,
      'SELECT offset_ms FROM clock WHERE id = 1 FOR UPDATE',
      {},
      transaction,
    );
    const realNow = Date.now();
    if (to <= realNow + (row?.offset_ms ?? 0))
      throw new Problem(422, 'clock-moves-forward', 'The clock moves forward only.', {
        errors: [{ path: 'to', message: 'Choose a moment that is still to come.' }],
      });
    await change(
      db,
      'UPDATE clock SET offset_ms = :offset WHERE id = 1',
      { offset: to - realNow },
      transaction,
    );
    await announce(db, transaction, 'clock');
  });
  await clock.refresh();
}
