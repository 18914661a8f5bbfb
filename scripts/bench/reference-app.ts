import express from 'express';
import pg from 'pg';

/*
 * The reference of the benches of the guest's sheet: a bare Express application, in a process of its own like ours, whose routes do nothing
 * but one SQL query. It is told where it lives by its environment.
 */
const pool = new pg.Pool({ connectionString: process.env.BENCH_DATABASE_URL, max: Number(process.env.BENCH_CONNECTIONS) });
const app = express();

app.get('/sheet/:id', async (req, res) => {
  const { rows } = await pool.query<{ body: string }>('select body from bench_bodies where id = $1', [req.params.id]);
  res.type('application/json').send(rows[0]?.body);
});

app.put('/marks/:sheetId/:proofId/:accountId', async (req, res) => {
  const { sheetId, proofId, accountId } = req.params;
  await pool.query(
    `insert into bench_marks (sheet_id, proof_id, account_id) values ($1, $2, $3)
     on conflict (sheet_id, proof_id, account_id) do update set marked_at = now()`,
    [sheetId, proofId, accountId],
  );
  res.json({ marked: true });
});

app.listen(Number(process.env.BENCH_PORT), '127.0.0.1', () => process.send?.('ready'));
process.on('disconnect', () => process.exit(0));
