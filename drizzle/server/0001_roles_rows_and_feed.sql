-- The role "app" (what the server signs in as) sees one shop at a time: row-level security, enabled and forced on every
-- table with a shop. "owner" owns the tables and is bound too, but for the few look-ups below.
CREATE FUNCTION current_shop() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('app.shop_id', true), '')::uuid $$;
--> statement-breakpoint
CREATE FUNCTION bind_rows_to_shop(wanted regclass) RETURNS void LANGUAGE plpgsql AS $$
DECLARE shop_column text := CASE WHEN wanted = 'shops'::regclass THEN 'id' ELSE 'shop_id' END;
BEGIN
  EXECUTE format('ALTER TABLE %s ENABLE ROW LEVEL SECURITY', wanted);
  EXECUTE format('ALTER TABLE %s FORCE ROW LEVEL SECURITY', wanted);
  EXECUTE format('CREATE POLICY one_shop ON %s USING (%I = current_shop()) WITH CHECK (%I = current_shop())',
                 wanted, shop_column, shop_column);
  EXECUTE format('GRANT SELECT, INSERT, UPDATE ON %s TO app', wanted);
END $$;
--> statement-breakpoint
SELECT bind_rows_to_shop(name::regclass) FROM unnest(ARRAY[
  'shops', 'feeds', 'people', 'memberships', 'pins', 'sign_ins', 'devices', 'enrolment_codes', 'changes', 'disputes',
  'audit', 'customers', 'heads', 'stages', 'port_dimensions', 'benches', 'calibrations', 'sessions', 'runs', 'rungs',
  'readings']) AS name;
--> statement-breakpoint
-- history is append-only: nobody who serves requests can change or remove a line of it
REVOKE UPDATE ON changes, audit FROM app;
--> statement-breakpoint
GRANT SELECT ON epochs TO app;
--> statement-breakpoint
INSERT INTO epochs (bump) VALUES (1);
--> statement-breakpoint
-- Look-ups made before the shop is known return ids and nothing else. They run as "owner", which may read these three.
CREATE POLICY look_up ON people FOR SELECT TO owner USING (true);
--> statement-breakpoint
CREATE POLICY look_up ON devices FOR SELECT TO owner USING (true);
--> statement-breakpoint
CREATE POLICY look_up ON enrolment_codes FOR SELECT TO owner USING (true);
--> statement-breakpoint
CREATE POLICY look_up ON shops FOR SELECT TO owner USING (true);
--> statement-breakpoint
CREATE FUNCTION find_people_by_mail(wanted text) RETURNS TABLE (shop_id uuid, person_id uuid)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
  AS $$ SELECT p.shop_id, p.id FROM people p WHERE p.mail = wanted ORDER BY p.created_at, p.id $$;
--> statement-breakpoint
CREATE FUNCTION find_device(wanted text) RETURNS TABLE (shop_id uuid, device_id uuid)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
  AS $$ SELECT d.shop_id, d.id FROM devices d WHERE d.token_hash = wanted $$;
--> statement-breakpoint
CREATE FUNCTION find_enrolment_code(wanted text) RETURNS TABLE (shop_id uuid, code_id uuid)
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
  AS $$ SELECT c.shop_id, c.id FROM enrolment_codes c WHERE c.code_hash = wanted $$;
--> statement-breakpoint
CREATE FUNCTION has_any_shop() RETURNS boolean
  LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public AS $$ SELECT EXISTS (SELECT FROM shops) $$;
--> statement-breakpoint
CREATE INDEX people_mail ON people (mail);
--> statement-breakpoint
-- Feed: whoever writes a synced table holds the shop's feed lock, which withShopWrite takes first and marks here, and
-- has drawn numbers for the rows from the shop's counter. Commit order is feed order, so the feed has no holes. The
-- trigger only refuses: one that took the lock itself would deadlock with a push, and one that raised the counter row
-- by row made a batch of 500 three times slower.
CREATE FUNCTION draw_feed(wanted integer) RETURNS bigint LANGUAGE plpgsql AS $$
DECLARE newest bigint;
BEGIN
  IF nullif(current_setting('app.feed_lock', true), '')::uuid IS DISTINCT FROM current_shop() THEN
    RAISE EXCEPTION 'feed numbers drawn outside withShopWrite' USING ERRCODE = 'IW001';
  END IF;
  UPDATE feeds SET seq = seq + wanted WHERE shop_id = current_shop() RETURNING seq INTO STRICT newest;
  PERFORM set_config('app.feed_from', (newest - wanted)::text, true), set_config('app.feed_to', newest::text, true);
  RETURN newest - wanted;
END $$;
--> statement-breakpoint
CREATE FUNCTION is_in_feed(wanted_shop uuid, wanted_seq bigint) RETURNS boolean LANGUAGE sql STABLE
  AS $$ SELECT coalesce(
    current_setting('app.feed_lock', true) = wanted_shop::text
    AND wanted_seq > nullif(current_setting('app.feed_from', true), '')::bigint
    AND wanted_seq <= nullif(current_setting('app.feed_to', true), '')::bigint, false) $$;
--> statement-breakpoint
CREATE FUNCTION refuse_write() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'write to % outside withShopWrite, or without a number of its feed', tg_table_name USING ERRCODE = 'IW001';
END $$;
--> statement-breakpoint
CREATE FUNCTION join_feed(wanted regclass) RETURNS void LANGUAGE plpgsql AS $$
BEGIN
  EXECUTE format('CREATE TRIGGER join_feed BEFORE INSERT OR UPDATE ON %s FOR EACH ROW
                  WHEN (NOT is_in_feed(new.shop_id, new.seq)) EXECUTE FUNCTION refuse_write()', wanted);
END $$;
--> statement-breakpoint
SELECT join_feed(name::regclass) FROM unnest(ARRAY[
  'customers', 'heads', 'stages', 'port_dimensions', 'benches', 'calibrations', 'sessions', 'runs', 'rungs',
  'readings']) AS name;
--> statement-breakpoint
REVOKE ALL ON FUNCTION bind_rows_to_shop(regclass), join_feed(regclass) FROM PUBLIC;
