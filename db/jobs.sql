-- Rights of the application on the job queue, run by the owner after the queue's own migrations, as often as wanted.
-- The queue's tables are row-level-secured without a policy, so that nobody but their owner sees a row; the
-- application adds, takes and finishes jobs, and never changes a table.
grant usage on schema graphile_worker to tablewright_app;
grant select on all tables in schema graphile_worker to tablewright_app;
grant usage on all sequences in schema graphile_worker to tablewright_app;
grant execute on all functions in schema graphile_worker to tablewright_app;

do $$
declare
  secured text;
begin
  for secured in
    select relname from pg_class
    where relnamespace = 'graphile_worker'::regnamespace and relkind = 'r' and relrowsecurity
  loop
    execute format('grant insert, update, delete on graphile_worker.%I to tablewright_app', secured);
    execute format('drop policy if exists tablewright_app on graphile_worker.%I', secured);
    execute format(
      'create policy tablewright_app on graphile_worker.%I to tablewright_app using (true) with check (true)', secured
    );
  end loop;
end
$$;

-- The application reads which migrations have been run, to refuse to start on an older schema.
grant select on kysely_migration to tablewright_app;
