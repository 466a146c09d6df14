import type { SessionList } from '@/shared/schema/api';
import { SessionSummary } from '@/shared/schema/views';
import { withShop } from '@/db/server/transaction';
import type { PersonCtx } from '../ctx';

/** Every session of the shop, newest first, with what the list shows of it. */
export async function listSessions(ctx: PersonCtx): Promise<SessionList> {
  return withShop(ctx.db, ctx.actor.shopId, async ({ client }) => {
    const { rows } = await client.query<Record<string, unknown>>(`
      with living as (
        select r.session_id, g.id, g.by_person_id, g.at
        from readings g join runs r on r.id = g.run_id where not g.deleted and not r.deleted
      ), unsent as (
        select record_id from disputes where table_name = 'readings' and settled_at is null
        union select record_id from changes where table_name = 'readings' and verdict = 'held'
      ), keyed as (
        select l.session_id, count(*)::int as reading_count, max(l.at) as last_at,
          count(*) filter (where l.id in (select record_id from unsent))::int as not_sent_count,
          (select array_agg(p.name order by p.name) from people p where p.id = any(array_agg(l.by_person_id))) as names
        from living l group by l.session_id
      ), planned as (
        select r.session_id, count(distinct r.id)::int as run_count, count(g.id)::int as rung_count
        from runs r left join rungs g on g.run_id = r.id and not g.deleted where not r.deleted group by r.session_id
      )
      select s.id, s.label, s.state, c.name as "customerName", h.name as "headName", st.name as "stageName",
        b.name as "benchName", coalesce(p.run_count, 0) as "runCount", coalesce(p.rung_count, 0) as "rungCount",
        coalesce(k.reading_count, 0) as "readingCount", coalesce(k.not_sent_count, 0) as "notSentCount",
        coalesce(k.names, '{}') as "keyedBy", k.last_at as "lastReadingAt"
      from sessions s
        join stages st on st.id = s.stage_id join heads h on h.id = st.head_id
        join customers c on c.id = h.customer_id join benches b on b.id = s.bench_id
        left join keyed k on k.session_id = s.id left join planned p on p.session_id = s.id
      where not s.deleted order by s.id desc`);
    return { sessions: rows.map((row) => SessionSummary.parse(row)) };
  });
}
