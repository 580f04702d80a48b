import { type Kysely, sql } from "kysely";

/*
 * The rounds of a revision: comments are answered, lines of one draft are taken into another, and a finding that arises
 * only where part of a set is accepted can be set aside although no examination of the whole revision holds it.
 *
 * A line that is taken over stays the same row: its versions, their makers, decisions and comments go with it, so that
 * four eyes count every hand. A copy in the other revision was rejected because it would begin with one hand only.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table comment add column answers bigint references comment on delete restrict;
    comment on column comment.answers is 'The comment that this one answers; null where it opens a thread.';
    create index comment_answers on comment (answers) where answers is not null;
    create index comment_line on comment (line_id) where line_id is not null;

    create function tg_comment_answers() returns trigger language plpgsql as $$
    begin
      if new.answers is not null and not exists (
        select from comment c where c.id = new.answers and c.answers is null and c.line_id is not distinct from new.line_id
           and (c.line_id is not null or c.revision_id = new.revision_id)
      ) then
        raise exception 'An answer belongs to a comment that opens a thread about the same thing.' using errcode = 'TW006';
      end if;
      return new;
    end
    $$;
    comment on function tg_comment_answers() is 'Threads are one level deep and about one thing. Error TW006.';
    create trigger comment_answers before insert on comment for each row execute function tg_comment_answers();

    alter table revision_line
      add column begun_in integer references revision on delete restrict,
      add column came_from integer references revision on delete restrict,
      add column came_at timestamptz,
      add constraint revision_line_came_whole check ((begun_in is null) = (came_from is null) and (came_from is null) = (came_at is null));
    comment on column revision_line.begun_in is 'The revision it was first written in, to whose sheet row_number belongs; null for a line that never left its revision.';
    comment on column revision_line.came_from is 'The revision it was taken over from, the last one where there were several; null for a line that never left its revision.';
    comment on column revision_line.came_at is 'When it was taken over.';
    create index revision_line_begun_in on revision_line (begun_in) where begun_in is not null;
    create index revision_line_came_from on revision_line (came_from) where came_from is not null;
    grant update (revision_id, position, begun_in, came_from, came_at) on revision_line to tablewright_app;

    create or replace function tg_revision_line_row() returns trigger language plpgsql as $$
    begin
      if tg_op = 'INSERT' then
        if new.state <> 'open' then
          raise exception 'A line starts open.' using errcode = 'TW006';
        end if;
        return new;
      end if;
      if new.revision_id <> old.revision_id then
        if old.state not in ('open', 'accepted', 'declined') or exists (
          select from revision r where r.id in (old.revision_id, new.revision_id) and r.state not in ('draft', 'returned')
        ) then
          raise exception 'A line is taken over from one draft or returned revision into another.' using errcode = 'TW006';
        end if;
        if new.came_from is distinct from old.revision_id or new.begun_in is distinct from coalesce(old.begun_in, old.revision_id) then
          raise exception 'A line that is taken over says where it came from.' using errcode = 'TW001';
        end if;
      elsif (new.position, new.begun_in, new.came_from, new.came_at) is distinct from (old.position, old.begun_in, old.came_from, old.came_at) then
        raise exception 'What a line is about never changes; what it says is a new version.' using errcode = 'TW001';
      end if;
      if (to_jsonb(new) - 'state' - 'published_in' - 'against_row' - 'against_version' - 'revision_id' - 'position' - 'begun_in' - 'came_from' - 'came_at')
         is distinct from
         (to_jsonb(old) - 'state' - 'published_in' - 'against_row' - 'against_version' - 'revision_id' - 'position' - 'begun_in' - 'came_from' - 'came_at') then
        raise exception 'What a line is about never changes; what it says is a new version.' using errcode = 'TW001';
      end if;
      if new.state <> old.state then
        if new.state in ('accepted', 'declined') and pg_trigger_depth() < 2 then
          raise exception 'A line is accepted or declined by a decision.' using errcode = 'TW006';
        end if;
        if new.state = 'open' and pg_trigger_depth() < 2 then
          raise exception 'A line opens again by a new version.' using errcode = 'TW006';
        end if;
        if new.state = 'published' and (old.state <> 'accepted' or new.published_in is distinct from (select number from edition where state = 'open')) then
          raise exception 'Only an accepted line is published, with the edition that is being published.' using errcode = 'TW002';
        end if;
        if old.state = 'published' then
          raise exception 'A published line never changes.' using errcode = 'TW001';
        end if;
      end if;
      return new;
    end
    $$;

    -- A sheet's row belongs to the revision that the sheet became, wherever the line went since.
    create or replace function line_hands(of_line bigint) returns setof uuid language sql stable as $$
      select v.made_by from line_version v where v.line_id = of_line
      union
      select r.repaired_by
        from revision_line l
        join revision v on v.id = coalesce(l.begun_in, l.revision_id)
        join sheet_repair r on r.sheet_id = v.sheet_id and r.row_number = l.row_number
       where l.id = of_line
    $$;

    alter table finding_set_aside add column sentence text;
    comment on column finding_set_aside.sentence is 'What the finding said, where it arose from accepting part of a set and no examination of the revision holds it; null otherwise.';
  `.execute(db);
}
