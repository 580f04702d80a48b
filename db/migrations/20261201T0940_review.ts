import { type Kysely, sql } from "kysely";

/*
 * What is proposed, and who decided it. A revision holds lines; what a line says is a line_version, and editing a line
 * makes a new version, which visibly voids the decision on the old one. Decisions are rows that are only ever added.
 * Four eyes is held here as well as in the code: whoever had a hand in a line cannot decide it, and an edition whose
 * every line comes from its publisher cannot be sealed.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table revision (
      id integer generated always as identity primary key,
      title text not null,
      summary text not null default '',
      state text not null default 'draft',
      round integer not null default 0,
      sheet_id integer references sheet on delete restrict,
      made_by uuid not null references person on delete restrict,
      made_at timestamptz not null default now(),
      sent_at timestamptz,
      decided_at timestamptz,
      constraint revision_title_form check (length(btrim(title)) between 1 and 200 and title !~ '[[:cntrl:]]'),
      constraint revision_state_known check (state in ('draft', 'in_review', 'returned', 'decided', 'withdrawn')),
      constraint revision_round check (round >= 0 and (state = 'draft' or state = 'withdrawn' or round > 0))
    );
    create index revision_state on revision (state);
    comment on table revision is 'A set of proposed changes to the table: draft, in review, returned, decided or withdrawn.';
    comment on column revision.round is 'How many times it was sent to review.';
    alter table sheet add constraint sheet_revision foreign key (revision_id) references revision on delete restrict;

    create table revision_move (
      id bigint generated always as identity primary key,
      revision_id integer not null references revision on delete restrict,
      came_from text not null,
      went_to text not null,
      round integer not null,
      moved_by uuid not null references person on delete restrict,
      moved_at timestamptz not null default clock_timestamp(),
      remark text not null default ''
    );
    create index revision_move_revision on revision_move (revision_id, id);
    comment on table revision_move is 'Every step of a revision: who sent, returned, decided or withdrew it, when and with which words.';

    create table revision_line (
      id bigint generated always as identity primary key,
      revision_id integer not null references revision on delete restrict,
      position integer not null,
      kind text not null,
      species_id text references species on delete restrict,
      property text collate "C",
      source_id text references source on delete restrict,
      row_number integer,
      against_row bigint,
      against_version bigint,
      state text not null default 'open',
      published_in integer references edition on delete restrict,
      constraint revision_line_kind_known check (kind in ('value', 'withdrawal', 'detail', 'source')),
      constraint revision_line_subject check (
        case kind
          when 'source' then source_id is not null and species_id is null and property is null
          when 'detail' then species_id is not null and source_id is null and property is null
          else species_id is not null and property is not null and source_id is null
        end),
      constraint revision_line_property_known check (property in ('enthalpyOfFormation', 'entropy', 'gibbsEnergyOfFormation', 'heatCapacity', 'enthalpyIncrement')),
      constraint revision_line_state_known check (state in ('open', 'accepted', 'declined', 'dropped', 'published')),
      constraint revision_line_published check ((state = 'published') = (published_in is not null)),
      constraint revision_line_against_one check (against_row is null or against_version is null)
    );
    create index revision_line_revision on revision_line (revision_id, position);
    create index revision_line_species on revision_line (species_id) where state in ('open', 'accepted');
    create index revision_line_published_in on revision_line (published_in) where published_in is not null;
    -- Two lines, one value: at most one accepted line waits for a species and property, for a species' detail, for a source.
    create unique index revision_line_one_waits_species on revision_line (species_id, coalesce(property, '')) where state = 'accepted' and species_id is not null;
    create unique index revision_line_one_waits_source on revision_line (source_id) where state = 'accepted' and source_id is not null;
    -- And one revision says a thing once.
    create unique index revision_line_once_species on revision_line (revision_id, species_id, coalesce(property, '')) where species_id is not null and state <> 'dropped';
    create unique index revision_line_once_source on revision_line (revision_id, source_id) where source_id is not null and state <> 'dropped';
    comment on table revision_line is 'One proposed change: a value, its withdrawal, what a species is called, or a source.';
    comment on column revision_line.row_number is 'The sheet row it was read from; null when written by hand.';
    comment on column revision_line.against_row is 'The standing row it was written against (id in table_value, species_detail or source_detail by kind); null when nothing stood.';
    comment on column revision_line.against_version is 'The accepted line that waited when this one was written, as the version it had; null when none waited.';
    comment on column revision_line.state is 'Follows the newest decision on the newest version, by trigger; published once an edition holds it; dropped when its revision was withdrawn or the line taken out.';

    create table line_version (
      id bigint generated always as identity primary key,
      line_id bigint not null references revision_line on delete restrict,
      version integer not null,
      content jsonb not null,
      content_hash bytea not null,
      made_by uuid not null references person on delete restrict,
      made_at timestamptz not null default clock_timestamp(),
      reason text not null default '',
      constraint line_version_once unique (line_id, version),
      constraint line_version_number check (version > 0),
      constraint line_version_hash_is_sha256 check (octet_length(content_hash) = 32),
      constraint line_version_content_is_object check (jsonb_typeof(content) = 'object')
    );
    comment on table line_version is 'What a line says; the newest version counts, older ones stay.';
    comment on column line_version.content is 'Shape by kind: app/review/content.ts.';
    alter table species_detail add constraint species_detail_line_version foreign key (line_version_id) references line_version on delete restrict;
    alter table source_detail add constraint source_detail_line_version foreign key (line_version_id) references line_version on delete restrict;
    alter table table_value add constraint table_value_line_version foreign key (line_version_id) references line_version on delete restrict;
    alter table revision_line add constraint revision_line_against_version foreign key (against_version) references line_version on delete restrict;

    create table line_decision (
      id bigint generated always as identity primary key,
      line_version_id bigint not null references line_version on delete restrict,
      decision text not null,
      reason text not null default '',
      decided_by uuid not null references person on delete restrict,
      decided_at timestamptz not null default clock_timestamp(),
      constraint line_decision_known check (decision in ('accept', 'decline')),
      constraint line_decision_decline_has_reason check (decision = 'accept' or length(btrim(reason)) > 0)
    );
    create index line_decision_version on line_decision (line_version_id, id);
    comment on table line_decision is 'Decisions, only ever added; the newest on the newest version counts.';

    create table comment (
      id bigint generated always as identity primary key,
      revision_id integer not null references revision on delete restrict,
      line_id bigint references revision_line on delete restrict,
      round integer not null,
      body text not null,
      written_by uuid not null references person on delete restrict,
      written_at timestamptz not null default clock_timestamp(),
      constraint comment_body check (length(btrim(body)) between 1 and 5000)
    );
    create index comment_revision on comment (revision_id, id);
    comment on table comment is 'What steward and reviewer wrote to each other, on a revision or on one of its lines.';

    create table examination (
      id bigint generated always as identity primary key,
      revision_id integer references revision on delete restrict,
      edition integer references edition on delete restrict,
      occasion text not null,
      policy integer not null,
      checks jsonb not null,
      input_digest bytea not null,
      examined_at timestamptz not null default clock_timestamp(),
      lines integer not null,
      blocks integer not null,
      looks integer not null,
      remarks integer not null,
      constraint examination_occasion_known check (occasion in ('build', 'edit', 'send', 'publish')),
      constraint examination_hash_is_sha256 check (octet_length(input_digest) = 32)
    );
    create index examination_revision on examination (revision_id, id desc);
    comment on table examination is 'One run of the checks: what they saw (digest), in which versions, against which edition, and how many findings came of it.';
    comment on column examination.edition is 'The newest edition at the time; null before the first.';

    create table finding (
      id bigint generated always as identity primary key,
      examination_id bigint not null references examination on delete restrict,
      revision_id integer references revision on delete restrict,
      line_id bigint references revision_line on delete restrict,
      species_id text not null references species on delete restrict,
      property text,
      check_code text not null,
      severity text not null,
      sentence text not null,
      arithmetic jsonb not null,
      data jsonb not null,
      suggestions jsonb not null,
      fingerprint bytea not null,
      constraint finding_severity_known check (severity in ('block', 'look', 'remark')),
      constraint finding_fingerprint_is_sha256 check (octet_length(fingerprint) = 32)
    );
    create index finding_examination on finding (examination_id);
    create index finding_line on finding (line_id) where line_id is not null;
    comment on table finding is 'What a check found, with its arithmetic.';
    comment on column finding.fingerprint is 'SHA-256 over check, subject and numbers: a finding set aside stays so only while it says the same.';

    create table finding_set_aside (
      id bigint generated always as identity primary key,
      revision_id integer not null references revision on delete restrict,
      fingerprint bytea not null,
      reason text not null,
      set_aside_by uuid not null references person on delete restrict,
      set_aside_at timestamptz not null default clock_timestamp(),
      constraint finding_set_aside_once unique (revision_id, fingerprint),
      constraint finding_set_aside_reason check (length(btrim(reason)) > 0),
      constraint finding_set_aside_hash check (octet_length(fingerprint) = 32)
    );
    comment on table finding_set_aside is 'Blocking findings that a reviewer set aside, with the reason.';

    -- Append-only.
    create trigger line_version_append_only before update or delete on line_version for each row execute function tg_forbid_change();
    create trigger line_decision_append_only before update or delete on line_decision for each row execute function tg_forbid_change();
    create trigger revision_move_append_only before update or delete on revision_move for each row execute function tg_forbid_change();
    create trigger comment_append_only before update or delete on comment for each row execute function tg_forbid_change();
    create trigger examination_append_only before update or delete on examination for each row execute function tg_forbid_change();
    create trigger finding_append_only before update or delete on finding for each row execute function tg_forbid_change();
    create trigger finding_set_aside_append_only before update or delete on finding_set_aside for each row execute function tg_forbid_change();
    create trigger line_version_no_truncate before truncate on line_version for each statement execute function tg_forbid_change();
    create trigger line_decision_no_truncate before truncate on line_decision for each statement execute function tg_forbid_change();

    create function tg_revision_moves() returns trigger language plpgsql as $$
    begin
      if new.state <> old.state and not (
           (old.state = 'draft' and new.state in ('in_review', 'withdrawn'))
        or (old.state = 'in_review' and new.state in ('returned', 'decided', 'withdrawn'))
        or (old.state = 'returned' and new.state in ('in_review', 'withdrawn'))) then
        raise exception 'A revision does not go from % to %.', old.state, new.state using errcode = 'TW006';
      end if;
      return new;
    end
    $$;
    comment on function tg_revision_moves() is 'The revision''s state machine (app/review/states.ts). Error TW006.';
    create trigger revision_moves before update on revision for each row execute function tg_revision_moves();

    -- A new version of a line voids what was decided on the one before.
    create function tg_line_version_added() returns trigger language plpgsql as $$
    declare
      line_state text;
      revision_state text;
    begin
      select l.state, r.state into line_state, revision_state
        from revision_line l join revision r on r.id = l.revision_id where l.id = new.line_id;
      if revision_state not in ('draft', 'returned') then
        raise exception 'Lines are edited while their revision is a draft or was returned.' using errcode = 'TW006';
      end if;
      if line_state not in ('open', 'accepted', 'declined') then
        raise exception 'This line is published or dropped and takes no further version.' using errcode = 'TW006';
      end if;
      if new.version <> (select coalesce(max(version), 0) + 1 from line_version where line_id = new.line_id) then
        raise exception 'Versions of a line are numbered without gaps.' using errcode = 'TW006';
      end if;
      -- A line is born open, so the first version of each of a sheet's thousands of lines has nothing to reopen.
      if line_state <> 'open' then
        update revision_line set state = 'open' where id = new.line_id;
      end if;
      return new;
    end
    $$;
    create trigger line_version_added before insert on line_version for each row execute function tg_line_version_added();

    -- Everyone who had a hand in a line: its versions, and the repairs of the row it was read from.
    create function line_hands(of_line bigint) returns setof uuid language sql stable as $$
      select v.made_by from line_version v where v.line_id = of_line
      union
      select r.repaired_by
        from revision_line l
        join revision v on v.id = l.revision_id
        join sheet_repair r on r.sheet_id = v.sheet_id and r.row_number = l.row_number
       where l.id = of_line
    $$;
    comment on function line_hands(bigint) is 'The people who made a version of the line or repaired its sheet row; none of them may decide it.';

    create function tg_line_decision_added() returns trigger language plpgsql as $$
    declare
      line revision_line;
    begin
      select l.* into line from revision_line l join line_version v on v.line_id = l.id where v.id = new.line_version_id for update of l;
      if (select state from revision where id = line.revision_id) <> 'in_review' then
        raise exception 'Lines are decided while their revision is in review.' using errcode = 'TW006';
      end if;
      if line.state not in ('open', 'accepted', 'declined') then
        raise exception 'This line is % and cannot be decided.', line.state using errcode = 'TW006';
      end if;
      if new.line_version_id <> (select id from line_version where line_id = line.id order by version desc limit 1) then
        raise exception 'The line was edited since: decide what it says now.' using errcode = 'TW007';
      end if;
      if new.decided_by in (select line_hands(line.id)) then
        raise exception 'Whoever had a hand in a line cannot decide it.' using errcode = 'TW008';
      end if;
      if not exists (select from person_role where person_id = new.decided_by and role = 'reviewer') then
        raise exception 'Only a reviewer decides a line.' using errcode = 'TW008';
      end if;
      update revision_line set state = case new.decision when 'accept' then 'accepted' else 'declined' end where id = line.id;
      return new;
    end
    $$;
    comment on function tg_line_decision_added() is 'Four eyes for a line. TW006: wrong state; TW007: the line was edited since; TW008: own line, or no reviewer.';
    create trigger line_decision_added before insert on line_decision for each row execute function tg_line_decision_added();

    -- A line's state is not written by hand: it follows decisions, publication and the fate of its revision.
    create function tg_revision_line_row() returns trigger language plpgsql as $$
    begin
      if tg_op = 'INSERT' then
        if new.state <> 'open' then
          raise exception 'A line starts open.' using errcode = 'TW006';
        end if;
        return new;
      end if;
      if (to_jsonb(new) - 'state' - 'published_in' - 'against_row' - 'against_version') is distinct from (to_jsonb(old) - 'state' - 'published_in' - 'against_row' - 'against_version') then
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
    create trigger revision_line_row before insert or update on revision_line for each row execute function tg_revision_line_row();
    create trigger revision_line_no_delete before delete on revision_line for each row execute function tg_forbid_change();
    create trigger revision_line_no_truncate before truncate on revision_line for each statement execute function tg_forbid_change();

    -- The two doors to an edition. They run with the owner's rights; the application may call them and nothing else.
    create function open_edition(expected_previous integer, publisher uuid, edition_notes text, edition_licence text,
                                 withdrawn_edition integer default null, reason text default null)
      returns integer language plpgsql security definer set search_path = public, pg_temp as $$
    declare
      newest record;
    begin
      -- One publication at a time; whoever waited here finds that the number has moved.
      perform pg_advisory_xact_lock(7270917);
      select number, digest into newest from edition order by number desc limit 1;
      if coalesce(newest.number, 0) <> expected_previous then
        raise exception 'Edition % was published in the meantime.', newest.number using errcode = 'TW009';
      end if;
      if not exists (select from person p join person_role r on r.person_id = p.id
                      where p.id = publisher and r.role = 'reviewer' and p.switched_off_at is null) then
        raise exception 'Only a reviewer publishes.' using errcode = 'TW008';
      end if;
      insert into edition (number, state, published_at, published_by, notes, licence, withdraws, withdrawal_reason, previous_digest)
      values (expected_previous + 1, 'open', date_trunc('milliseconds', clock_timestamp()), publisher, edition_notes, edition_licence, withdrawn_edition, reason, newest.digest);
      return expected_previous + 1;
    end
    $$;
    comment on function open_edition(integer, uuid, text, text, integer, text) is 'Opens the next edition inside the calling transaction. TW009: the expected number has moved; TW008: no reviewer.';

    create function edition_digest(n integer) returns bytea language sql stable as $$
      select sha256(
        coalesce((select string_agg(v.row_hash, ''::bytea order by d.key collate "C", v.property collate "C")
                    from table_value v
                    join species_detail d on d.species_id = v.species_id and d.since <= n and (d.until is null or d.until > n)
                   where v.since <= n and (v.until is null or v.until > n)), ''::bytea)
        || coalesce((select string_agg(d.row_hash, ''::bytea order by d.key collate "C")
                       from species_detail d where d.since <= n and (d.until is null or d.until > n)), ''::bytea)
        || coalesce((select string_agg(s.row_hash, ''::bytea order by s.source_id collate "C")
                       from source_detail s where s.since <= n and (s.until is null or s.until > n)), ''::bytea)
        || coalesce((select previous_digest from edition where number = n), ''::bytea)
        || convert_to(n::text || E'\\n' || (select licence from edition where number = n), 'UTF8'))
    $$;
    comment on function edition_digest(integer) is 'The digest of an edition from its rows; app/editions/digest.ts computes the same outside the database.';

    create function seal_edition(n integer) returns bytea language plpgsql security definer set search_path = public, pg_temp as $$
    declare
      this edition;
      computed bytea;
      stray bigint;
    begin
      select * into this from edition where number = n and state = 'open';
      if not found then
        raise exception 'Edition % is not open.', n using errcode = 'TW004';
      end if;
      -- Every row that came in carries a line published here, as accepted, by someone without a hand in it.
      select count(*) into stray
        from (select line_version_id from table_value where since = n
              union all select line_version_id from species_detail where since = n
              union all select line_version_id from source_detail where since = n) came
        join line_version v on v.id = came.line_version_id
        join revision_line l on l.id = v.line_id
       where l.published_in is distinct from n
          or not exists (select from line_decision d where d.line_version_id = v.id and d.decision = 'accept'
                           and d.decided_by not in (select line_hands(l.id)));
      if stray > 0 then
        raise exception '% rows of edition % have no accepted line behind them.', stray, n using errcode = 'TW008';
      end if;
      -- Every row that went out was replaced here, or withdrawn by a line published here.
      select count(*) into stray from table_value o
       where o.until = n
         and not exists (select from table_value c where c.species_id = o.species_id and c.property = o.property and c.since = n)
         and not exists (select from revision_line l where l.kind = 'withdrawal' and l.species_id = o.species_id and l.property = o.property and l.published_in = n);
      stray := stray + (select count(*) from species_detail o where o.until = n
         and not exists (select from species_detail c where c.species_id = o.species_id and c.since = n)
         and exists (select from table_value v where v.species_id = o.species_id and v.until is null));
      stray := stray + (select count(*) from source_detail o where o.until = n
         and not exists (select from source_detail c where c.source_id = o.source_id and c.since = n));
      if stray > 0 then
        raise exception '% rows went out of edition % without a line that says so.', stray, n using errcode = 'TW008';
      end if;
      -- Every value standing has a name and a source standing.
      if exists (select from table_value v where v.until is null
                   and (not exists (select from species_detail d where d.species_id = v.species_id and d.until is null)
                     or not exists (select from source_detail s where s.source_id = v.source_id and s.until is null))) then
        raise exception 'A value of edition % has no species or no source standing.', n using errcode = 'TW008';
      end if;
      if not exists (select from revision_line where published_in = n) then
        raise exception 'Edition % would hold nothing new.', n using errcode = 'TW008';
      end if;
      if not exists (select from revision_line l where l.published_in = n and this.published_by not in (select line_hands(l.id))) then
        raise exception 'Whoever publishes must not have written every line of the edition.' using errcode = 'TW008';
      end if;
      computed := edition_digest(n);
      update edition set
        state = 'sealed',
        digest = computed,
        species_count = (select count(*) from species_detail where until is null),
        value_count = (select count(*) from table_value where until is null),
        came = (select count(*) from table_value v where v.since = n and not exists (select from table_value o where o.species_id = v.species_id and o.property = v.property and o.until = n)),
        changed = (select count(*) from table_value v join table_value o on o.species_id = v.species_id and o.property = v.property and o.until = n where v.since = n and v.row_hash <> o.row_hash),
        went = (select count(*) from table_value o where o.until = n and not exists (select from table_value v where v.species_id = o.species_id and v.property = o.property and v.since = n))
      where number = n;
      return computed;
    end
    $$;
    comment on function seal_edition(integer) is 'Seals the open edition after holding its rows against the decisions. TW004: not open; TW008: a row without an accepted line, or every line the publisher''s own.';

    revoke execute on function open_edition(integer, uuid, text, text, integer, text), seal_edition(integer) from public;
    grant execute on function open_edition(integer, uuid, text, text, integer, text), seal_edition(integer), edition_digest(integer), line_hands(bigint) to tablewright_app;

    grant select, insert on revision, revision_move, revision_line, line_version, line_decision, comment, examination, finding, finding_set_aside to tablewright_app;
    grant update (title, summary, state, round, sent_at, decided_at) on revision to tablewright_app;
    grant update (state, published_in, against_row, against_version) on revision_line to tablewright_app;
  `.execute(db);
}
