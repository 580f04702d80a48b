--
-- PostgreSQL database dump
--

--
-- Name: public; Type: SCHEMA; Schema: -; Owner: -
--

CREATE SCHEMA public;

--
-- Name: SCHEMA public; Type: COMMENT; Schema: -; Owner: -
--

COMMENT ON SCHEMA public IS 'standard public schema';

--
-- Name: edition_digest(integer); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.edition_digest(n integer) RETURNS bytea
    LANGUAGE sql STABLE
    AS $$
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
        || convert_to(n::text || E'\n' || (select licence from edition where number = n), 'UTF8'))
    $$;

--
-- Name: FUNCTION edition_digest(n integer); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.edition_digest(n integer) IS 'The digest of an edition from its rows; app/editions/digest.ts computes the same outside the database.';

--
-- Name: hill_order(text); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.hill_order(hill text) RETURNS text
    LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
    AS $$
      select regexp_replace(regexp_replace(regexp_replace(hill, '([A-Z][a-z]?)(?![a-z0-9])', '\11', 'g'),
                                           '([0-9]+)', '000\1', 'g'),
                            '0*([0-9]{4})(?![0-9])', '\1', 'g') collate "C"
    $$;

--
-- Name: FUNCTION hill_order(hill text); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.hill_order(hill text) IS 'A formula in Hill order with every count written in four digits, so that C2H6 stands before C10H8 when compared by bytes.';

--
-- Name: line_hands(bigint); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.line_hands(of_line bigint) RETURNS SETOF uuid
    LANGUAGE sql STABLE
    AS $$
      select v.made_by from line_version v where v.line_id = of_line
      union
      select r.repaired_by
        from revision_line l
        join revision v on v.id = coalesce(l.begun_in, l.revision_id)
        join sheet_repair r on r.sheet_id = v.sheet_id and r.row_number = l.row_number
       where l.id = of_line
    $$;

--
-- Name: FUNCTION line_hands(of_line bigint); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.line_hands(of_line bigint) IS 'The people who made a version of the line or repaired its sheet row; none of them may decide it.';

--
-- Name: open_edition(integer, uuid, text, text, integer, text); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.open_edition(expected_previous integer, publisher uuid, edition_notes text, edition_licence text, withdrawn_edition integer DEFAULT NULL::integer, reason text DEFAULT NULL::text) RETURNS integer
    LANGUAGE plpgsql SECURITY DEFINER
    SET search_path TO 'public', 'pg_temp'
    AS $$
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

--
-- Name: FUNCTION open_edition(expected_previous integer, publisher uuid, edition_notes text, edition_licence text, withdrawn_edition integer, reason text); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.open_edition(expected_previous integer, publisher uuid, edition_notes text, edition_licence text, withdrawn_edition integer, reason text) IS 'Opens the next edition inside the calling transaction. TW009: the expected number has moved; TW008: no reviewer.';

--
-- Name: seal_edition(integer); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.seal_edition(n integer) RETURNS bytea
    LANGUAGE plpgsql SECURITY DEFINER
    SET search_path TO 'public', 'pg_temp'
    AS $$
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

--
-- Name: FUNCTION seal_edition(n integer); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.seal_edition(n integer) IS 'Seals the open edition after holding its rows against the decisions. TW004: not open; TW008: a row without an accepted line, or every line the publisher''s own.';

--
-- Name: species_names(text, text[]); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.species_names(name text, synonyms text[]) RETURNS text
    LANGUAGE sql IMMUTABLE STRICT PARALLEL SAFE
    AS $$ select lower(name || E'
' || array_to_string(synonyms, E'
')) $$;

--
-- Name: FUNCTION species_names(name text, synonyms text[]); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.species_names(name text, synonyms text[]) IS 'Everything a species is called, in small letters, one name a line: what a search by name looks in.';

--
-- Name: tg_comment_answers(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_comment_answers() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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

--
-- Name: FUNCTION tg_comment_answers(); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.tg_comment_answers() IS 'Threads are one level deep and about one thing. Error TW006.';

--
-- Name: tg_edition_is_sealed_at_commit(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_edition_is_sealed_at_commit() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      if exists (select from edition where state = 'open') then
        raise exception 'An edition is open only inside the transaction that publishes it.' using errcode = 'TW004';
      end if;
      return null;
    end
    $$;

--
-- Name: tg_edition_row(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_edition_row() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    declare
      newest record;
    begin
      if tg_op = 'INSERT' then
        select number, published_at, digest, state into newest from edition order by number desc limit 1;
        if new.state <> 'open' or new.number <> coalesce(newest.number, 0) + 1 then
          raise exception 'The next edition is %, and it starts open.', coalesce(newest.number, 0) + 1 using errcode = 'TW004';
        end if;
        if new.published_at <= newest.published_at then
          raise exception 'The clock of the database stands before the newest edition (%). Set it right, then publish again.', newest.published_at using errcode = 'TW005';
        end if;
        if new.previous_digest is distinct from newest.digest then
          raise exception 'An edition carries the digest of the one before it.' using errcode = 'TW004';
        end if;
        return new;
      end if;
      if tg_op = 'UPDATE' then
        if old.state <> 'open' or new.state <> 'sealed' or new.number <> old.number or new.published_at <> old.published_at
           or new.published_by <> old.published_by or new.notes <> old.notes or new.licence <> old.licence
           or new.previous_digest is distinct from old.previous_digest or new.withdraws is distinct from old.withdraws
           or new.withdrawal_reason is distinct from old.withdrawal_reason then
          raise exception 'A published edition never changes.' using errcode = 'TW001';
        end if;
        return new;
      end if;
      raise exception 'A published edition is never removed.' using errcode = 'TW001';
    end
    $$;

--
-- Name: tg_forbid_change(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_forbid_change() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      raise exception 'Rows of % are never changed or removed.', tg_table_name using errcode = 'TW001';
    end
    $$;

--
-- Name: FUNCTION tg_forbid_change(); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.tg_forbid_change() IS 'Guards append-only tables. Error TW001.';

--
-- Name: tg_line_decision_added(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_line_decision_added() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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

--
-- Name: FUNCTION tg_line_decision_added(); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.tg_line_decision_added() IS 'Four eyes for a line. TW006: wrong state; TW007: the line was edited since; TW008: own line, or no reviewer.';

--
-- Name: tg_line_version_added(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_line_version_added() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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

--
-- Name: tg_revision_line_row(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_revision_line_row() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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

--
-- Name: tg_revision_moves(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_revision_moves() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
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

--
-- Name: FUNCTION tg_revision_moves(); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.tg_revision_moves() IS 'The revision''s state machine (app/review/states.ts). Error TW006.';

--
-- Name: tg_sheet_moves(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_sheet_moves() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      if new.state <> old.state and not (
           (old.state = 'received' and new.state in ('planned', 'failed'))
        or (old.state = 'planned' and new.state in ('reading', 'failed'))
        or (old.state = 'reading' and new.state in ('read', 'failed'))
        or (old.state = 'read' and new.state in ('planned', 'built'))
        or (old.state = 'failed' and new.state in ('planned'))) then
        raise exception 'A sheet does not go from % to %.', old.state, new.state using errcode = 'TW006';
      end if;
      return new;
    end
    $$;

--
-- Name: FUNCTION tg_sheet_moves(); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.tg_sheet_moves() IS 'The sheet''s state machine. Error TW006.';

--
-- Name: tg_versioned_row(); Type: FUNCTION; Schema: public; Owner: -
--

CREATE FUNCTION public.tg_versioned_row() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    declare
      open_number integer := (select number from edition where state = 'open');
    begin
      if tg_op = 'INSERT' then
        if open_number is null or new.since is distinct from open_number or new.until is not null then
          raise exception 'A row of % comes in only with the edition that is being published.', tg_table_name using errcode = 'TW002';
        end if;
        return new;
      end if;
      if tg_op = 'UPDATE' then
        if old.until is not null or open_number is null or new.until is distinct from open_number
           or (to_jsonb(new) - 'until') is distinct from (to_jsonb(old) - 'until') then
          raise exception 'A row of % changes only once: it goes out with the edition that is being published.', tg_table_name using errcode = 'TW003';
        end if;
        return new;
      end if;
      raise exception 'Rows of % are never removed.', tg_table_name using errcode = 'TW001';
    end
    $$;

--
-- Name: FUNCTION tg_versioned_row(); Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON FUNCTION public.tg_versioned_row() IS 'Keeps editions frozen. TW002: came in outside its edition; TW003: changed otherwise than going out; TW001: removed.';

--
-- Name: address_change; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.address_change (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    token_hash bytea NOT NULL,
    person_id uuid NOT NULL,
    email text NOT NULL,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    ends_at timestamp with time zone NOT NULL,
    used_at timestamp with time zone,
    CONSTRAINT address_change_email_form CHECK (((email = lower(email)) AND (email ~ '^[^@[:space:][:cntrl:]]+@[^@[:space:][:cntrl:]]+$'::text) AND (length(email) <= 254))),
    CONSTRAINT address_change_token_is_sha256 CHECK ((octet_length(token_hash) = 32))
);

--
-- Name: TABLE address_change; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.address_change IS 'Single-use links by which a person confirms that they read letters at a new address.';

--
-- Name: COLUMN address_change.email; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.address_change.email IS 'The address that the account takes when the link is used.';

--
-- Name: COLUMN address_change.used_at; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.address_change.used_at IS 'When the link was used, or voided by another change of the account.';

--
-- Name: api_key; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.api_key (
    id text NOT NULL,
    person_id uuid NOT NULL,
    name text NOT NULL,
    scopes text[] NOT NULL,
    secret_hash bytea NOT NULL,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    ends_at timestamp with time zone NOT NULL,
    withdrawn_at timestamp with time zone,
    last_used_at timestamp with time zone,
    CONSTRAINT api_key_id_form CHECK ((id ~ '^[0-9a-z]{12}$'::text)),
    CONSTRAINT api_key_name_form CHECK ((((length(btrim(name)) >= 1) AND (length(btrim(name)) <= 80)) AND (name !~ '[[:cntrl:]]'::text))),
    CONSTRAINT api_key_scopes_known CHECK (((cardinality(scopes) > 0) AND (scopes <@ ARRAY['read'::text, 'sheets:write'::text]))),
    CONSTRAINT api_key_secret_is_sha256 CHECK ((octet_length(secret_hash) = 32))
);

--
-- Name: TABLE api_key; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.api_key IS 'Keys by which laboratory software reads the table. The secret is shown once; here stands its SHA-256.';

--
-- Name: COLUMN api_key.id; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.api_key.id IS 'The public part of the key, used to look it up.';

--
-- Name: audit_entry; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.audit_entry (
    number bigint NOT NULL,
    at timestamp with time zone NOT NULL,
    actor uuid,
    api_key_id text,
    act text NOT NULL,
    object_kind text NOT NULL,
    object_id text NOT NULL,
    detail jsonb NOT NULL,
    request_id text,
    previous_hash bytea NOT NULL,
    hash bytea NOT NULL,
    CONSTRAINT audit_entry_hash_is_sha256 CHECK (((octet_length(hash) = 32) AND (octet_length(previous_hash) = 32))),
    CONSTRAINT audit_entry_number_positive CHECK ((number > 0))
);

--
-- Name: TABLE audit_entry; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.audit_entry IS 'Append-only record, chained by SHA-256. Numbers have no gaps.';

--
-- Name: COLUMN audit_entry.actor; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.audit_entry.actor IS 'Null for acts of the system itself and of the command line.';

--
-- Name: COLUMN audit_entry.previous_hash; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.audit_entry.previous_hash IS 'Hash of the entry before; 32 zero bytes for the first.';

--
-- Name: COLUMN audit_entry.hash; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.audit_entry.hash IS 'SHA-256 of the RFC 8785 JSON of all other columns (app/audit/chain.ts).';

--
-- Name: column_plan; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.column_plan (
    id integer NOT NULL,
    heads_hash bytea NOT NULL,
    heads text[] NOT NULL,
    plan jsonb NOT NULL,
    settings jsonb NOT NULL,
    saved_by uuid NOT NULL,
    saved_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT column_plan_hash_is_sha256 CHECK ((octet_length(heads_hash) = 32))
);

--
-- Name: TABLE column_plan; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.column_plan IS 'Confirmed column plans, remembered for sheets with the same heads; the newest counts.';

--
-- Name: column_plan_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.column_plan ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.column_plan_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: comment; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.comment (
    id bigint NOT NULL,
    revision_id integer NOT NULL,
    line_id bigint,
    round integer NOT NULL,
    body text NOT NULL,
    written_by uuid NOT NULL,
    written_at timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
    answers bigint,
    CONSTRAINT comment_body CHECK (((length(btrim(body)) >= 1) AND (length(btrim(body)) <= 5000)))
);

--
-- Name: TABLE comment; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.comment IS 'What steward and reviewer wrote to each other, on a revision or on one of its lines.';

--
-- Name: COLUMN comment.answers; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.comment.answers IS 'The comment that this one answers; null where it opens a thread.';

--
-- Name: comment_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.comment ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.comment_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: edition; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.edition (
    number integer NOT NULL,
    state text NOT NULL,
    published_at timestamp with time zone NOT NULL,
    published_by uuid NOT NULL,
    notes text NOT NULL,
    licence text NOT NULL,
    withdraws integer,
    withdrawal_reason text,
    species_count integer,
    value_count integer,
    came integer,
    changed integer,
    went integer,
    digest bytea,
    previous_digest bytea,
    CONSTRAINT edition_number_positive CHECK ((number > 0)),
    CONSTRAINT edition_previous_digest CHECK (((number = 1) = (previous_digest IS NULL))),
    CONSTRAINT edition_sealed_is_whole CHECK (((state = 'open'::text) OR ((species_count IS NOT NULL) AND (value_count IS NOT NULL) AND (came IS NOT NULL) AND (changed IS NOT NULL) AND (went IS NOT NULL) AND (octet_length(digest) = 32)))),
    CONSTRAINT edition_state_known CHECK ((state = ANY (ARRAY['open'::text, 'sealed'::text]))),
    CONSTRAINT edition_withdrawal_has_reason CHECK ((((withdraws IS NULL) = (withdrawal_reason IS NULL)) AND ((withdrawal_reason IS NULL) OR (length(btrim(withdrawal_reason)) > 0)))),
    CONSTRAINT edition_withdraws_an_older CHECK ((withdraws < number))
);

--
-- Name: TABLE edition; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.edition IS 'Numbered editions without gaps. Open only inside the transaction that publishes it; sealed for good at its end.';

--
-- Name: COLUMN edition.licence; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.edition.licence IS 'SPDX licence identifier.';

--
-- Name: COLUMN edition.withdraws; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.edition.withdraws IS 'The older edition that this one withdraws; its bytes stay readable.';

--
-- Name: COLUMN edition.came; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.edition.came IS 'How many values came in with this edition, net.';

--
-- Name: COLUMN edition.digest; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.edition.digest IS 'SHA-256 over the row hashes in order, the previous digest, the number and the licence (app/editions/digest.ts).';

--
-- Name: examination; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.examination (
    id bigint NOT NULL,
    revision_id integer,
    edition integer,
    occasion text NOT NULL,
    policy integer NOT NULL,
    checks jsonb NOT NULL,
    input_digest bytea NOT NULL,
    examined_at timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
    lines integer NOT NULL,
    blocks integer NOT NULL,
    looks integer NOT NULL,
    remarks integer NOT NULL,
    CONSTRAINT examination_hash_is_sha256 CHECK ((octet_length(input_digest) = 32)),
    CONSTRAINT examination_occasion_known CHECK ((occasion = ANY (ARRAY['build'::text, 'edit'::text, 'send'::text, 'publish'::text])))
);

--
-- Name: TABLE examination; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.examination IS 'One run of the checks: what they saw (digest), in which versions, against which edition, and how many findings came of it.';

--
-- Name: COLUMN examination.edition; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.examination.edition IS 'The newest edition at the time; null before the first.';

--
-- Name: examination_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.examination ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.examination_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: finding; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.finding (
    id bigint NOT NULL,
    examination_id bigint NOT NULL,
    revision_id integer,
    line_id bigint,
    species_id text NOT NULL,
    property text,
    check_code text NOT NULL,
    severity text NOT NULL,
    sentence text NOT NULL,
    arithmetic jsonb NOT NULL,
    data jsonb NOT NULL,
    suggestions jsonb NOT NULL,
    fingerprint bytea NOT NULL,
    CONSTRAINT finding_fingerprint_is_sha256 CHECK ((octet_length(fingerprint) = 32)),
    CONSTRAINT finding_severity_known CHECK ((severity = ANY (ARRAY['block'::text, 'look'::text, 'remark'::text])))
);

--
-- Name: TABLE finding; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.finding IS 'What a check found, with its arithmetic.';

--
-- Name: COLUMN finding.fingerprint; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.finding.fingerprint IS 'SHA-256 over check, subject and numbers: a finding set aside stays so only while it says the same.';

--
-- Name: finding_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.finding ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.finding_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: finding_set_aside; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.finding_set_aside (
    id bigint NOT NULL,
    revision_id integer NOT NULL,
    fingerprint bytea NOT NULL,
    reason text NOT NULL,
    set_aside_by uuid NOT NULL,
    set_aside_at timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
    sentence text,
    CONSTRAINT finding_set_aside_hash CHECK ((octet_length(fingerprint) = 32)),
    CONSTRAINT finding_set_aside_reason CHECK ((length(btrim(reason)) > 0))
);

--
-- Name: TABLE finding_set_aside; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.finding_set_aside IS 'Blocking findings that a reviewer set aside, with the reason.';

--
-- Name: COLUMN finding_set_aside.sentence; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.finding_set_aside.sentence IS 'What the finding said, where it arose from accepting part of a set and no examination of the revision holds it; null otherwise.';

--
-- Name: finding_set_aside_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.finding_set_aside ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.finding_set_aside_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: invitation; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.invitation (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    token_hash bytea NOT NULL,
    person_id uuid NOT NULL,
    invited_by uuid,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    ends_at timestamp with time zone NOT NULL,
    used_at timestamp with time zone,
    CONSTRAINT invitation_token_is_sha256 CHECK ((octet_length(token_hash) = 32))
);

--
-- Name: TABLE invitation; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.invitation IS 'Single-use links by which an invited person sets the first password.';

--
-- Name: letter; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.letter (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    kind text NOT NULL,
    to_address text NOT NULL,
    to_person uuid,
    subject text NOT NULL,
    body text NOT NULL,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    sent_at timestamp with time zone,
    attempts integer DEFAULT 0 NOT NULL,
    last_error text,
    path text,
    from_person uuid,
    CONSTRAINT letter_attempts CHECK ((attempts >= 0)),
    CONSTRAINT letter_one_line_head CHECK (((subject !~ '[[:cntrl:]]'::text) AND (to_address !~ '[[:cntrl:]]'::text))),
    CONSTRAINT letter_path_of_this_site CHECK (((path ~ '^/([^/\\]|$)'::text) AND (path !~ '[[:cntrl:][:space:]]'::text)))
);

--
-- Name: TABLE letter; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.letter IS 'The outbox: a letter is written in the transaction of the act it tells of and sent by the worker afterwards.';

--
-- Name: COLUMN letter.sent_at; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.letter.sent_at IS 'Null while it waits to be sent.';

--
-- Name: COLUMN letter.path; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.letter.path IS 'The page the letter is about, as a path of this site; null when there is none or the link is made on sending.';

--
-- Name: COLUMN letter.from_person; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.letter.from_person IS 'On whose act the letter is written; null for the system and the command line.';

--
-- Name: line_decision; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.line_decision (
    id bigint NOT NULL,
    line_version_id bigint NOT NULL,
    decision text NOT NULL,
    reason text DEFAULT ''::text NOT NULL,
    decided_by uuid NOT NULL,
    decided_at timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
    CONSTRAINT line_decision_decline_has_reason CHECK (((decision = 'accept'::text) OR (length(btrim(reason)) > 0))),
    CONSTRAINT line_decision_known CHECK ((decision = ANY (ARRAY['accept'::text, 'decline'::text])))
);

--
-- Name: TABLE line_decision; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.line_decision IS 'Decisions, only ever added; the newest on the newest version counts.';

--
-- Name: line_decision_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.line_decision ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.line_decision_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: line_version; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.line_version (
    id bigint NOT NULL,
    line_id bigint NOT NULL,
    version integer NOT NULL,
    content jsonb NOT NULL,
    content_hash bytea NOT NULL,
    made_by uuid NOT NULL,
    made_at timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
    reason text DEFAULT ''::text NOT NULL,
    CONSTRAINT line_version_content_is_object CHECK ((jsonb_typeof(content) = 'object'::text)),
    CONSTRAINT line_version_hash_is_sha256 CHECK ((octet_length(content_hash) = 32)),
    CONSTRAINT line_version_number CHECK ((version > 0))
);

--
-- Name: TABLE line_version; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.line_version IS 'What a line says; the newest version counts, older ones stay.';

--
-- Name: COLUMN line_version.content; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.line_version.content IS 'Shape by kind: app/review/content.ts.';

--
-- Name: line_version_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.line_version ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.line_version_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: password_reset; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.password_reset (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    token_hash bytea NOT NULL,
    person_id uuid NOT NULL,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    ends_at timestamp with time zone NOT NULL,
    used_at timestamp with time zone,
    CONSTRAINT password_reset_token_is_sha256 CHECK ((octet_length(token_hash) = 32))
);

--
-- Name: TABLE password_reset; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.password_reset IS 'Single-use links by which a person sets a new password.';

--
-- Name: person; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.person (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    email text NOT NULL,
    name text NOT NULL,
    password_hash text,
    switched_off_at timestamp with time zone,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT person_email_form CHECK (((email = lower(email)) AND (email ~ '^[^@[:space:][:cntrl:]]+@[^@[:space:][:cntrl:]]+$'::text) AND (length(email) <= 254))),
    CONSTRAINT person_name_form CHECK ((((length(btrim(name)) >= 1) AND (length(btrim(name)) <= 120)) AND (name !~ '[[:cntrl:]]'::text)))
);

--
-- Name: TABLE person; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.person IS 'One account per person. Never deleted and never handed on: acts keep naming it.';

--
-- Name: COLUMN person.email; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.person.email IS 'Lower case; the address the person signs in with.';

--
-- Name: COLUMN person.password_hash; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.person.password_hash IS 'argon2id in PHC form; null until an invitation is taken up.';

--
-- Name: COLUMN person.switched_off_at; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.person.switched_off_at IS 'When the account was switched off; null while it may be used.';

--
-- Name: person_role; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.person_role (
    person_id uuid NOT NULL,
    role text NOT NULL,
    given_by uuid,
    given_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT person_role_known CHECK ((role = ANY (ARRAY['analyst'::text, 'steward'::text, 'reviewer'::text, 'administrator'::text])))
);

--
-- Name: TABLE person_role; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.person_role IS 'The roles a person holds now; a person may hold several. What each may do is app/people/permissions.ts.';

--
-- Name: COLUMN person_role.given_by; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.person_role.given_by IS 'Null when the role was given by the command line or the demo.';

--
-- Name: revision; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.revision (
    id integer NOT NULL,
    title text NOT NULL,
    summary text DEFAULT ''::text NOT NULL,
    state text DEFAULT 'draft'::text NOT NULL,
    round integer DEFAULT 0 NOT NULL,
    sheet_id integer,
    made_by uuid NOT NULL,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    sent_at timestamp with time zone,
    decided_at timestamp with time zone,
    CONSTRAINT revision_round CHECK (((round >= 0) AND ((state = 'draft'::text) OR (state = 'withdrawn'::text) OR (round > 0)))),
    CONSTRAINT revision_state_known CHECK ((state = ANY (ARRAY['draft'::text, 'in_review'::text, 'returned'::text, 'decided'::text, 'withdrawn'::text]))),
    CONSTRAINT revision_title_form CHECK ((((length(btrim(title)) >= 1) AND (length(btrim(title)) <= 200)) AND (title !~ '[[:cntrl:]]'::text)))
);

--
-- Name: TABLE revision; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.revision IS 'A set of proposed changes to the table: draft, in review, returned, decided or withdrawn.';

--
-- Name: COLUMN revision.round; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision.round IS 'How many times it was sent to review.';

--
-- Name: revision_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.revision ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.revision_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: revision_line; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.revision_line (
    id bigint NOT NULL,
    revision_id integer NOT NULL,
    "position" integer NOT NULL,
    kind text NOT NULL,
    species_id text,
    property text COLLATE pg_catalog."C",
    source_id text,
    row_number integer,
    against_row bigint,
    against_version bigint,
    state text DEFAULT 'open'::text NOT NULL,
    published_in integer,
    begun_in integer,
    came_from integer,
    came_at timestamp with time zone,
    CONSTRAINT revision_line_against_one CHECK (((against_row IS NULL) OR (against_version IS NULL))),
    CONSTRAINT revision_line_came_whole CHECK ((((begun_in IS NULL) = (came_from IS NULL)) AND ((came_from IS NULL) = (came_at IS NULL)))),
    CONSTRAINT revision_line_kind_known CHECK ((kind = ANY (ARRAY['value'::text, 'withdrawal'::text, 'detail'::text, 'source'::text]))),
    CONSTRAINT revision_line_property_known CHECK ((property = ANY (ARRAY['enthalpyOfFormation'::text, 'entropy'::text, 'gibbsEnergyOfFormation'::text, 'heatCapacity'::text, 'enthalpyIncrement'::text]))),
    CONSTRAINT revision_line_published CHECK (((state = 'published'::text) = (published_in IS NOT NULL))),
    CONSTRAINT revision_line_state_known CHECK ((state = ANY (ARRAY['open'::text, 'accepted'::text, 'declined'::text, 'dropped'::text, 'published'::text]))),
    CONSTRAINT revision_line_subject CHECK (
CASE kind
    WHEN 'source'::text THEN ((source_id IS NOT NULL) AND (species_id IS NULL) AND (property IS NULL))
    WHEN 'detail'::text THEN ((species_id IS NOT NULL) AND (source_id IS NULL) AND (property IS NULL))
    ELSE ((species_id IS NOT NULL) AND (property IS NOT NULL) AND (source_id IS NULL))
END)
);

--
-- Name: TABLE revision_line; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.revision_line IS 'One proposed change: a value, its withdrawal, what a species is called, or a source.';

--
-- Name: COLUMN revision_line.row_number; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision_line.row_number IS 'The sheet row it was read from; null when written by hand.';

--
-- Name: COLUMN revision_line.against_row; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision_line.against_row IS 'The standing row it was written against (id in table_value, species_detail or source_detail by kind); null when nothing stood.';

--
-- Name: COLUMN revision_line.against_version; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision_line.against_version IS 'The accepted line that waited when this one was written, as the version it had; null when none waited.';

--
-- Name: COLUMN revision_line.state; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision_line.state IS 'Follows the newest decision on the newest version, by trigger; published once an edition holds it; dropped when its revision was withdrawn or the line taken out.';

--
-- Name: COLUMN revision_line.begun_in; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision_line.begun_in IS 'The revision it was first written in, to whose sheet row_number belongs; null for a line that never left its revision.';

--
-- Name: COLUMN revision_line.came_from; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision_line.came_from IS 'The revision it was taken over from, the last one where there were several; null for a line that never left its revision.';

--
-- Name: COLUMN revision_line.came_at; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.revision_line.came_at IS 'When it was taken over.';

--
-- Name: revision_line_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.revision_line ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.revision_line_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: revision_move; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.revision_move (
    id bigint NOT NULL,
    revision_id integer NOT NULL,
    came_from text NOT NULL,
    went_to text NOT NULL,
    round integer NOT NULL,
    moved_by uuid NOT NULL,
    moved_at timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
    remark text DEFAULT ''::text NOT NULL
);

--
-- Name: TABLE revision_move; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.revision_move IS 'Every step of a revision: who sent, returned, decided or withdrew it, when and with which words.';

--
-- Name: revision_move_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.revision_move ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.revision_move_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: session; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.session (
    token_hash bytea NOT NULL,
    person_id uuid NOT NULL,
    begun_at timestamp with time zone DEFAULT now() NOT NULL,
    seen_at timestamp with time zone DEFAULT now() NOT NULL,
    ends_at timestamp with time zone NOT NULL,
    ended_at timestamp with time zone,
    agent text DEFAULT ''::text NOT NULL,
    CONSTRAINT session_token_is_sha256 CHECK ((octet_length(token_hash) = 32))
);

--
-- Name: TABLE session; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.session IS 'Signed-in sessions. The cookie holds the token, this table only its SHA-256.';

--
-- Name: COLUMN session.ends_at; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.session.ends_at IS 'The absolute limit; the idle limit is counted from seen_at.';

--
-- Name: COLUMN session.ended_at; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.session.ended_at IS 'When the session was ended by signing out, by its owner elsewhere or by an administrator.';

--
-- Name: sheet; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.sheet (
    id integer NOT NULL,
    name text NOT NULL,
    byte_length bigint NOT NULL,
    sha256 bytea NOT NULL,
    uploaded_by uuid NOT NULL,
    received_at timestamp with time zone DEFAULT now() NOT NULL,
    state text DEFAULT 'received'::text NOT NULL,
    failure text,
    dialect jsonb,
    heads text[],
    plan jsonb,
    plan_confirmed_by uuid,
    plan_confirmed_at timestamp with time zone,
    source_choice jsonb,
    settings jsonb DEFAULT '{}'::jsonb NOT NULL,
    rows_total integer,
    rows_done integer DEFAULT 0 NOT NULL,
    revision_id integer,
    CONSTRAINT sheet_built_has_revision CHECK (((state <> 'built'::text) OR (revision_id IS NOT NULL))),
    CONSTRAINT sheet_failure_has_reason CHECK (((state = 'failed'::text) = (failure IS NOT NULL))),
    CONSTRAINT sheet_hash_is_sha256 CHECK ((octet_length(sha256) = 32)),
    CONSTRAINT sheet_name_form CHECK ((((length(name) >= 1) AND (length(name) <= 255)) AND (name !~ '[[:cntrl:]]'::text))),
    CONSTRAINT sheet_read_has_plan CHECK (((state = ANY (ARRAY['received'::text, 'planned'::text, 'failed'::text])) OR ((plan IS NOT NULL) AND (plan_confirmed_by IS NOT NULL) AND (plan_confirmed_at IS NOT NULL)))),
    CONSTRAINT sheet_state_known CHECK ((state = ANY (ARRAY['received'::text, 'planned'::text, 'reading'::text, 'read'::text, 'built'::text, 'failed'::text])))
);

--
-- Name: TABLE sheet; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.sheet IS 'An uploaded property sheet: received, planned (its columns have a meaning, waiting to be confirmed), reading, read, built (a revision stands) or failed.';

--
-- Name: COLUMN sheet.name; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet.name IS 'The name the file had; never used as a path.';

--
-- Name: COLUMN sheet.dialect; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet.dialect IS 'Encoding, delimiter and decimal sign as decoded (app/intake/decode.ts).';

--
-- Name: COLUMN sheet.plan; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet.plan IS 'What each column means (app/intake/plan.ts); guessed until plan_confirmed_at.';

--
-- Name: COLUMN sheet.source_choice; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet.source_choice IS 'The source the sheet''s values come from: an existing id, or the citation of a new one.';

--
-- Name: COLUMN sheet.settings; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet.settings IS 'What the steward said of the whole sheet: temperature, standard pressure, kind of uncertainty, solute basis.';

--
-- Name: COLUMN sheet.rows_done; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet.rows_done IS 'Progress of the reading.';

--
-- Name: sheet_chunk; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.sheet_chunk (
    sheet_id integer NOT NULL,
    number integer NOT NULL,
    bytes bytea NOT NULL,
    CONSTRAINT sheet_chunk_number CHECK ((number >= 0)),
    CONSTRAINT sheet_chunk_size CHECK (((octet_length(bytes) >= 1) AND (octet_length(bytes) <= 1048576)))
);

--
-- Name: TABLE sheet_chunk; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.sheet_chunk IS 'The uploaded bytes, in order, at most 1 MB a row.';

--
-- Name: sheet_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.sheet ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.sheet_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: sheet_repair; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.sheet_repair (
    id bigint NOT NULL,
    sheet_id integer NOT NULL,
    row_number integer NOT NULL,
    column_index integer NOT NULL,
    was text NOT NULL,
    becomes text NOT NULL,
    repaired_by uuid NOT NULL,
    repaired_at timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
    note text,
    CONSTRAINT sheet_repair_column CHECK ((column_index >= 0))
);

--
-- Name: TABLE sheet_repair; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.sheet_repair IS 'Cells mended on the page: the newest repair of a cell counts, the original stays in sheet_row.cells.';

--
-- Name: sheet_repair_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.sheet_repair ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.sheet_repair_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: sheet_row; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.sheet_row (
    sheet_id integer NOT NULL,
    number integer NOT NULL,
    cells text[] NOT NULL,
    outcome text NOT NULL,
    problems jsonb DEFAULT '[]'::jsonb NOT NULL,
    reading jsonb,
    left_out_by uuid,
    left_out_at timestamp with time zone,
    CONSTRAINT sheet_row_left_out CHECK (((left_out_by IS NULL) = (left_out_at IS NULL))),
    CONSTRAINT sheet_row_outcome_known CHECK ((outcome = ANY (ARRAY['read'::text, 'refused'::text, 'skipped'::text]))),
    CONSTRAINT sheet_row_reading CHECK (((outcome = 'read'::text) = (reading IS NOT NULL))),
    CONSTRAINT sheet_row_reason CHECK (((outcome = 'read'::text) OR (jsonb_array_length(problems) > 0)))
);

--
-- Name: TABLE sheet_row; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.sheet_row IS 'What became of each row: read, refused with reasons by cell, or skipped with a reason.';

--
-- Name: COLUMN sheet_row.number; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet_row.number IS 'Row number as a person counts in the file: the heads are row 1.';

--
-- Name: COLUMN sheet_row.cells; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet_row.cells IS 'The cells as uploaded, to the letter, in the encoding the sheet is read in. Repairs are sheet_repair.';

--
-- Name: COLUMN sheet_row.left_out_at; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.sheet_row.left_out_at IS 'When the steward chose to leave a refused row out.';

--
-- Name: source; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.source (
    id text DEFAULT ('src_'::text || replace((gen_random_uuid())::text, '-'::text, ''::text)) NOT NULL,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT source_id_form CHECK ((id ~ '^src_[0-9a-z]{8,40}$'::text))
);

--
-- Name: TABLE source; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.source IS 'A frozen identity for a source; its citation is versioned in source_detail.';

--
-- Name: source_detail; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.source_detail (
    id bigint NOT NULL,
    source_id text NOT NULL COLLATE pg_catalog."C",
    citation jsonb NOT NULL,
    doi text,
    kind text NOT NULL,
    notice text,
    line_version_id bigint NOT NULL,
    row_hash bytea NOT NULL,
    since integer NOT NULL,
    until integer,
    CONSTRAINT source_detail_citation_is_object CHECK ((jsonb_typeof(citation) = 'object'::text)),
    CONSTRAINT source_detail_hash_is_sha256 CHECK ((octet_length(row_hash) = 32)),
    CONSTRAINT source_detail_kind_known CHECK ((kind = ANY (ARRAY['measurement'::text, 'evaluation'::text, 'calculation'::text, 'estimate'::text]))),
    CONSTRAINT source_detail_range CHECK (((until IS NULL) OR (until > since)))
);

--
-- Name: TABLE source_detail; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.source_detail IS 'The citation of a source, by edition. citation is CSL-JSON.';

--
-- Name: COLUMN source_detail.notice; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.source_detail.notice IS 'A retraction, an erratum or another warning shown beside the source; null without one.';

--
-- Name: source_detail_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.source_detail ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.source_detail_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: species; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.species (
    id text DEFAULT ('sp_'::text || replace((gen_random_uuid())::text, '-'::text, ''::text)) NOT NULL,
    hill text NOT NULL,
    composition jsonb NOT NULL,
    charge integer NOT NULL,
    phase text NOT NULL,
    made_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT species_composition_is_object CHECK ((jsonb_typeof(composition) = 'object'::text)),
    CONSTRAINT species_id_form CHECK ((id ~ '^sp_[0-9a-z]{8,40}$'::text)),
    CONSTRAINT species_phase_known CHECK ((phase = ANY (ARRAY['g'::text, 'l'::text, 's'::text, 'cr'::text, 'am'::text, 'vit'::text, 'aq'::text])))
);

--
-- Name: TABLE species; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.species IS 'What a species is made of: never changes. What it is called is species_detail.';

--
-- Name: COLUMN species.hill; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.species.hill IS 'Formula in Hill order, exact fractions, without the charge.';

--
-- Name: COLUMN species.composition; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.species.composition IS 'Element symbol (D and T apart from H) to count of atoms.';

--
-- Name: species_detail; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.species_detail (
    id bigint NOT NULL,
    species_id text NOT NULL,
    key text NOT NULL COLLATE pg_catalog."C",
    printed text NOT NULL,
    label text,
    name text NOT NULL,
    cas text,
    inchikey text,
    synonyms text[] DEFAULT '{}'::text[] NOT NULL,
    line_version_id bigint NOT NULL,
    row_hash bytea NOT NULL,
    since integer NOT NULL,
    until integer,
    CONSTRAINT species_detail_cas_form CHECK (((cas IS NULL) OR (cas ~ '^[0-9]{2,7}-[0-9]{2}-[0-9]$'::text))),
    CONSTRAINT species_detail_hash_is_sha256 CHECK ((octet_length(row_hash) = 32)),
    CONSTRAINT species_detail_inchikey_form CHECK (((inchikey IS NULL) OR (inchikey ~ '^[A-Z]{14}-[A-Z]{10}-[A-Z]$'::text))),
    CONSTRAINT species_detail_key_form CHECK (((key !~ '[[:space:]]'::text) AND ((length(key) >= 1) AND (length(key) <= 300)))),
    CONSTRAINT species_detail_label_form CHECK (((label IS NULL) OR (label ~ '^[^[:space:]]+$'::text))),
    CONSTRAINT species_detail_range CHECK (((until IS NULL) OR (until > since)))
);

--
-- Name: TABLE species_detail; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.species_detail IS 'What a species is called, by edition. The key is unique in an edition.';

--
-- Name: COLUMN species_detail.label; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.species_detail.label IS 'The form of a solid or the name of an isomer where formula, charge and phase leave more than one substance; null where they do not.';

--
-- Name: COLUMN species_detail.line_version_id; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.species_detail.line_version_id IS 'The proposal, as accepted, that brought this row.';

--
-- Name: species_detail_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.species_detail ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.species_detail_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: table_value; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.table_value (
    id bigint NOT NULL,
    species_id text NOT NULL,
    property text NOT NULL COLLATE pg_catalog."C",
    value numeric NOT NULL,
    uncertainty numeric,
    uncertainty_kind text,
    coverage_factor numeric,
    temperature numeric NOT NULL,
    standard_pressure numeric NOT NULL,
    basis text,
    origin text NOT NULL,
    method text,
    given_text text NOT NULL,
    given_unit text NOT NULL,
    given_note text,
    remark text,
    source_id text NOT NULL,
    line_version_id bigint NOT NULL,
    row_hash bytea NOT NULL,
    since integer NOT NULL,
    until integer,
    CONSTRAINT table_value_basis_known CHECK ((basis = ANY (ARRAY['molality'::text, 'concentration'::text]))),
    CONSTRAINT table_value_coverage_factor CHECK ((((coverage_factor IS NOT NULL) = (NOT (uncertainty_kind IS DISTINCT FROM 'expanded'::text))) AND ((coverage_factor IS NULL) OR (coverage_factor > (0)::numeric)))),
    CONSTRAINT table_value_exact_is_zero CHECK (((uncertainty_kind IS DISTINCT FROM 'exact'::text) OR (uncertainty = (0)::numeric))),
    CONSTRAINT table_value_hash_is_sha256 CHECK ((octet_length(row_hash) = 32)),
    CONSTRAINT table_value_is_a_number CHECK ((value <> ALL (ARRAY['NaN'::numeric, 'Infinity'::numeric, '-Infinity'::numeric]))),
    CONSTRAINT table_value_origin_known CHECK ((origin = ANY (ARRAY['stated'::text, 'derived'::text]))),
    CONSTRAINT table_value_pressure_positive CHECK ((standard_pressure > (0)::numeric)),
    CONSTRAINT table_value_property_known CHECK ((property = ANY (ARRAY['enthalpyOfFormation'::text, 'entropy'::text, 'gibbsEnergyOfFormation'::text, 'heatCapacity'::text, 'enthalpyIncrement'::text]))),
    CONSTRAINT table_value_range CHECK (((until IS NULL) OR (until > since))),
    CONSTRAINT table_value_temperature_positive CHECK ((temperature > (0)::numeric)),
    CONSTRAINT table_value_uncertainty_kind_known CHECK ((uncertainty_kind = ANY (ARRAY['exact'::text, 'standard'::text, 'expanded'::text, 'unstated'::text]))),
    CONSTRAINT table_value_uncertainty_not_negative CHECK (((uncertainty IS NULL) OR ((uncertainty >= (0)::numeric) AND (uncertainty <> ALL (ARRAY['NaN'::numeric, 'Infinity'::numeric]))))),
    CONSTRAINT table_value_uncertainty_whole CHECK (((uncertainty IS NULL) = (uncertainty_kind IS NULL)))
);

--
-- Name: TABLE table_value; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.table_value IS 'The values, by edition. The scale of numeric keeps the digits: 205.10 is not 205.1.';

--
-- Name: COLUMN table_value.value; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.value IS 'In the unit of the property: kJ/mol for enthalpyOfFormation, gibbsEnergyOfFormation and enthalpyIncrement; J/(mol K) for entropy and heatCapacity.';

--
-- Name: COLUMN table_value.uncertainty; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.uncertainty IS 'In the unit of the value, as given; null = none stated.';

--
-- Name: COLUMN table_value.uncertainty_kind; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.uncertainty_kind IS 'exact (by convention), standard (k = 1), expanded (with its coverage factor), unstated (counted as k = 2); null = none stated.';

--
-- Name: COLUMN table_value.temperature; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.temperature IS 'In kelvin.';

--
-- Name: COLUMN table_value.standard_pressure; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.standard_pressure IS 'In pascal.';

--
-- Name: COLUMN table_value.basis; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.basis IS 'Standard state of a solute as the source said it: molality (1 mol/kg) or concentration (1 mol/L); null for other phases or when not said.';

--
-- Name: COLUMN table_value.given_text; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.given_text IS 'What the sheet said, to the letter.';

--
-- Name: COLUMN table_value.given_unit; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.given_unit IS 'The unit the sheet used.';

--
-- Name: COLUMN table_value.given_note; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.given_note IS 'The conversion that was applied, null when there was none.';

--
-- Name: COLUMN table_value.remark; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.remark IS 'A remark of the source that checks heed, such as a constraint its compilers relaxed; null without one.';

--
-- Name: COLUMN table_value.row_hash; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.table_value.row_hash IS 'SHA-256 of the RFC 8785 JSON of the published fields (app/editions/digest.ts).';

--
-- Name: table_value_id_seq; Type: SEQUENCE; Schema: public; Owner: -
--

ALTER TABLE public.table_value ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.table_value_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

--
-- Name: try_count; Type: TABLE; Schema: public; Owner: -
--

CREATE TABLE public.try_count (
    limit_name text NOT NULL,
    subject_hash bytea NOT NULL,
    began_at timestamp with time zone NOT NULL,
    tries integer NOT NULL,
    CONSTRAINT try_count_positive CHECK ((tries > 0)),
    CONSTRAINT try_count_subject_is_sha256 CHECK ((octet_length(subject_hash) = 32))
);

--
-- Name: TABLE try_count; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON TABLE public.try_count IS 'How often something limited was tried in the running window; rows of past windows are cleared away.';

--
-- Name: COLUMN try_count.limit_name; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.try_count.limit_name IS 'Which limit, a name of app/people/limits.ts.';

--
-- Name: COLUMN try_count.subject_hash; Type: COMMENT; Schema: public; Owner: -
--

COMMENT ON COLUMN public.try_count.subject_hash IS 'SHA-256 of what the limit counts by: a source, an address, or both.';

--
-- Name: address_change address_change_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.address_change
    ADD CONSTRAINT address_change_pkey PRIMARY KEY (id);

--
-- Name: address_change address_change_token_hash_key; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.address_change
    ADD CONSTRAINT address_change_token_hash_key UNIQUE (token_hash);

--
-- Name: api_key api_key_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.api_key
    ADD CONSTRAINT api_key_pkey PRIMARY KEY (id);

--
-- Name: audit_entry audit_entry_hash_key; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.audit_entry
    ADD CONSTRAINT audit_entry_hash_key UNIQUE (hash);

--
-- Name: audit_entry audit_entry_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.audit_entry
    ADD CONSTRAINT audit_entry_pkey PRIMARY KEY (number);

--
-- Name: column_plan column_plan_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.column_plan
    ADD CONSTRAINT column_plan_pkey PRIMARY KEY (id);

--
-- Name: comment comment_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.comment
    ADD CONSTRAINT comment_pkey PRIMARY KEY (id);

--
-- Name: edition edition_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.edition
    ADD CONSTRAINT edition_pkey PRIMARY KEY (number);

--
-- Name: edition edition_withdrawn_once; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.edition
    ADD CONSTRAINT edition_withdrawn_once UNIQUE (withdraws);

--
-- Name: examination examination_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.examination
    ADD CONSTRAINT examination_pkey PRIMARY KEY (id);

--
-- Name: finding finding_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding
    ADD CONSTRAINT finding_pkey PRIMARY KEY (id);

--
-- Name: finding_set_aside finding_set_aside_once; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding_set_aside
    ADD CONSTRAINT finding_set_aside_once UNIQUE (revision_id, fingerprint);

--
-- Name: finding_set_aside finding_set_aside_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding_set_aside
    ADD CONSTRAINT finding_set_aside_pkey PRIMARY KEY (id);

--
-- Name: invitation invitation_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.invitation
    ADD CONSTRAINT invitation_pkey PRIMARY KEY (id);

--
-- Name: invitation invitation_token_hash_key; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.invitation
    ADD CONSTRAINT invitation_token_hash_key UNIQUE (token_hash);

--
-- Name: letter letter_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.letter
    ADD CONSTRAINT letter_pkey PRIMARY KEY (id);

--
-- Name: line_decision line_decision_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.line_decision
    ADD CONSTRAINT line_decision_pkey PRIMARY KEY (id);

--
-- Name: line_version line_version_once; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.line_version
    ADD CONSTRAINT line_version_once UNIQUE (line_id, version);

--
-- Name: line_version line_version_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.line_version
    ADD CONSTRAINT line_version_pkey PRIMARY KEY (id);

--
-- Name: password_reset password_reset_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.password_reset
    ADD CONSTRAINT password_reset_pkey PRIMARY KEY (id);

--
-- Name: password_reset password_reset_token_hash_key; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.password_reset
    ADD CONSTRAINT password_reset_token_hash_key UNIQUE (token_hash);

--
-- Name: person person_email_unique; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.person
    ADD CONSTRAINT person_email_unique UNIQUE (email);

--
-- Name: person person_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.person
    ADD CONSTRAINT person_pkey PRIMARY KEY (id);

--
-- Name: person_role person_role_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.person_role
    ADD CONSTRAINT person_role_pkey PRIMARY KEY (person_id, role);

--
-- Name: revision_line revision_line_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_pkey PRIMARY KEY (id);

--
-- Name: revision_move revision_move_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_move
    ADD CONSTRAINT revision_move_pkey PRIMARY KEY (id);

--
-- Name: revision revision_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision
    ADD CONSTRAINT revision_pkey PRIMARY KEY (id);

--
-- Name: session session_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.session
    ADD CONSTRAINT session_pkey PRIMARY KEY (token_hash);

--
-- Name: sheet_chunk sheet_chunk_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_chunk
    ADD CONSTRAINT sheet_chunk_pkey PRIMARY KEY (sheet_id, number);

--
-- Name: sheet sheet_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet
    ADD CONSTRAINT sheet_pkey PRIMARY KEY (id);

--
-- Name: sheet_repair sheet_repair_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_repair
    ADD CONSTRAINT sheet_repair_pkey PRIMARY KEY (id);

--
-- Name: sheet_row sheet_row_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_row
    ADD CONSTRAINT sheet_row_pkey PRIMARY KEY (sheet_id, number);

--
-- Name: source_detail source_detail_one_at_a_time; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.source_detail
    ADD CONSTRAINT source_detail_one_at_a_time EXCLUDE USING gist (source_id WITH =, int4range(since, until) WITH &&);

--
-- Name: source_detail source_detail_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.source_detail
    ADD CONSTRAINT source_detail_pkey PRIMARY KEY (id);

--
-- Name: source source_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.source
    ADD CONSTRAINT source_pkey PRIMARY KEY (id);

--
-- Name: species_detail species_detail_key_once_an_edition; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species_detail
    ADD CONSTRAINT species_detail_key_once_an_edition EXCLUDE USING gist (key WITH =, int4range(since, until) WITH &&);

--
-- Name: species_detail species_detail_one_at_a_time; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species_detail
    ADD CONSTRAINT species_detail_one_at_a_time EXCLUDE USING gist (species_id WITH =, int4range(since, until) WITH &&);

--
-- Name: species_detail species_detail_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species_detail
    ADD CONSTRAINT species_detail_pkey PRIMARY KEY (id);

--
-- Name: species species_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species
    ADD CONSTRAINT species_pkey PRIMARY KEY (id);

--
-- Name: table_value table_value_one_at_a_time; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.table_value
    ADD CONSTRAINT table_value_one_at_a_time EXCLUDE USING gist (species_id WITH =, property WITH =, int4range(since, until) WITH &&);

--
-- Name: table_value table_value_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.table_value
    ADD CONSTRAINT table_value_pkey PRIMARY KEY (id);

--
-- Name: try_count try_count_pkey; Type: CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.try_count
    ADD CONSTRAINT try_count_pkey PRIMARY KEY (limit_name, subject_hash);

--
-- Name: address_change_person; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX address_change_person ON public.address_change USING btree (person_id);

--
-- Name: api_key_person; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX api_key_person ON public.api_key USING btree (person_id);

--
-- Name: audit_entry_act; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX audit_entry_act ON public.audit_entry USING btree (act, number);

--
-- Name: audit_entry_actor; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX audit_entry_actor ON public.audit_entry USING btree (actor, number);

--
-- Name: audit_entry_object; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX audit_entry_object ON public.audit_entry USING btree (object_kind, object_id, number);

--
-- Name: column_plan_heads; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX column_plan_heads ON public.column_plan USING btree (heads_hash, id DESC);

--
-- Name: comment_answers; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX comment_answers ON public.comment USING btree (answers) WHERE (answers IS NOT NULL);

--
-- Name: comment_line; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX comment_line ON public.comment USING btree (line_id) WHERE (line_id IS NOT NULL);

--
-- Name: comment_revision; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX comment_revision ON public.comment USING btree (revision_id, id);

--
-- Name: edition_one_open; Type: INDEX; Schema: public; Owner: -
--

CREATE UNIQUE INDEX edition_one_open ON public.edition USING btree (state) WHERE (state = 'open'::text);

--
-- Name: examination_revision; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX examination_revision ON public.examination USING btree (revision_id, id DESC);

--
-- Name: finding_examination; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX finding_examination ON public.finding USING btree (examination_id);

--
-- Name: finding_line; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX finding_line ON public.finding USING btree (line_id) WHERE (line_id IS NOT NULL);

--
-- Name: invitation_person; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX invitation_person ON public.invitation USING btree (person_id);

--
-- Name: letter_address; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX letter_address ON public.letter USING btree (to_address, made_at);

--
-- Name: letter_waiting; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX letter_waiting ON public.letter USING btree (made_at) WHERE (sent_at IS NULL);

--
-- Name: line_decision_version; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX line_decision_version ON public.line_decision USING btree (line_version_id, id);

--
-- Name: password_reset_person; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX password_reset_person ON public.password_reset USING btree (person_id);

--
-- Name: revision_line_begun_in; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX revision_line_begun_in ON public.revision_line USING btree (begun_in) WHERE (begun_in IS NOT NULL);

--
-- Name: revision_line_came_from; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX revision_line_came_from ON public.revision_line USING btree (came_from) WHERE (came_from IS NOT NULL);

--
-- Name: revision_line_once_source; Type: INDEX; Schema: public; Owner: -
--

CREATE UNIQUE INDEX revision_line_once_source ON public.revision_line USING btree (revision_id, source_id) WHERE ((source_id IS NOT NULL) AND (state <> 'dropped'::text));

--
-- Name: revision_line_once_species; Type: INDEX; Schema: public; Owner: -
--

CREATE UNIQUE INDEX revision_line_once_species ON public.revision_line USING btree (revision_id, species_id, COALESCE(property, ''::text)) WHERE ((species_id IS NOT NULL) AND (state <> 'dropped'::text));

--
-- Name: revision_line_one_waits_source; Type: INDEX; Schema: public; Owner: -
--

CREATE UNIQUE INDEX revision_line_one_waits_source ON public.revision_line USING btree (source_id) WHERE ((state = 'accepted'::text) AND (source_id IS NOT NULL));

--
-- Name: revision_line_one_waits_species; Type: INDEX; Schema: public; Owner: -
--

CREATE UNIQUE INDEX revision_line_one_waits_species ON public.revision_line USING btree (species_id, COALESCE(property, ''::text)) WHERE ((state = 'accepted'::text) AND (species_id IS NOT NULL));

--
-- Name: revision_line_published_in; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX revision_line_published_in ON public.revision_line USING btree (published_in) WHERE (published_in IS NOT NULL);

--
-- Name: revision_line_revision; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX revision_line_revision ON public.revision_line USING btree (revision_id, "position");

--
-- Name: revision_line_species; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX revision_line_species ON public.revision_line USING btree (species_id) WHERE (state = ANY (ARRAY['open'::text, 'accepted'::text]));

--
-- Name: revision_move_revision; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX revision_move_revision ON public.revision_move USING btree (revision_id, id);

--
-- Name: revision_state; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX revision_state ON public.revision USING btree (state);

--
-- Name: session_person; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX session_person ON public.session USING btree (person_id) WHERE (ended_at IS NULL);

--
-- Name: session_person_begun; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX session_person_begun ON public.session USING btree (person_id, begun_at DESC);

--
-- Name: sheet_repair_row; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX sheet_repair_row ON public.sheet_repair USING btree (sheet_id, row_number);

--
-- Name: sheet_row_outcome; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX sheet_row_outcome ON public.sheet_row USING btree (sheet_id, outcome, number);

--
-- Name: sheet_uploaded_by; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX sheet_uploaded_by ON public.sheet USING btree (uploaded_by);

--
-- Name: source_detail_since; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX source_detail_since ON public.source_detail USING btree (since);

--
-- Name: source_detail_until; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX source_detail_until ON public.source_detail USING btree (until);

--
-- Name: species_detail_cas; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_detail_cas ON public.species_detail USING btree (cas) WHERE (cas IS NOT NULL);

--
-- Name: species_detail_key; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_detail_key ON public.species_detail USING btree (key);

--
-- Name: species_detail_key_part; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_detail_key_part ON public.species_detail USING gin (lower(key) public.gin_trgm_ops);

--
-- Name: species_detail_name_part; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_detail_name_part ON public.species_detail USING gin (public.species_names(name, synonyms) public.gin_trgm_ops);

--
-- Name: species_detail_since; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_detail_since ON public.species_detail USING btree (since);

--
-- Name: species_detail_species; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_detail_species ON public.species_detail USING btree (species_id);

--
-- Name: species_detail_until; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_detail_until ON public.species_detail USING btree (until);

--
-- Name: species_elements; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_elements ON public.species USING gin (composition);

--
-- Name: species_hill; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_hill ON public.species USING btree (hill, charge, phase);

--
-- Name: species_in_hill_order; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX species_in_hill_order ON public.species USING btree (public.hill_order(hill) COLLATE "C", id);

--
-- Name: table_value_in_order; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX table_value_in_order ON public.table_value USING btree (property, value);

--
-- Name: table_value_one_standing; Type: INDEX; Schema: public; Owner: -
--

CREATE UNIQUE INDEX table_value_one_standing ON public.table_value USING btree (species_id, property) WHERE (until IS NULL);

--
-- Name: table_value_since; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX table_value_since ON public.table_value USING btree (since);

--
-- Name: table_value_source; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX table_value_source ON public.table_value USING btree (source_id);

--
-- Name: table_value_species; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX table_value_species ON public.table_value USING btree (species_id, property);

--
-- Name: table_value_until; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX table_value_until ON public.table_value USING btree (until);

--
-- Name: try_count_began; Type: INDEX; Schema: public; Owner: -
--

CREATE INDEX try_count_began ON public.try_count USING btree (began_at);

--
-- Name: audit_entry audit_entry_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER audit_entry_append_only BEFORE DELETE OR UPDATE ON public.audit_entry FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: audit_entry audit_entry_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER audit_entry_no_truncate BEFORE TRUNCATE ON public.audit_entry FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: comment comment_answers; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER comment_answers BEFORE INSERT ON public.comment FOR EACH ROW EXECUTE FUNCTION public.tg_comment_answers();

--
-- Name: comment comment_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER comment_append_only BEFORE DELETE OR UPDATE ON public.comment FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: edition edition_is_sealed_at_commit; Type: TRIGGER; Schema: public; Owner: -
--

CREATE CONSTRAINT TRIGGER edition_is_sealed_at_commit AFTER INSERT OR UPDATE ON public.edition DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION public.tg_edition_is_sealed_at_commit();

--
-- Name: edition edition_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER edition_no_truncate BEFORE TRUNCATE ON public.edition FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: edition edition_row; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER edition_row BEFORE INSERT OR DELETE OR UPDATE ON public.edition FOR EACH ROW EXECUTE FUNCTION public.tg_edition_row();

--
-- Name: examination examination_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER examination_append_only BEFORE DELETE OR UPDATE ON public.examination FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: finding finding_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER finding_append_only BEFORE DELETE OR UPDATE ON public.finding FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: finding_set_aside finding_set_aside_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER finding_set_aside_append_only BEFORE DELETE OR UPDATE ON public.finding_set_aside FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: line_decision line_decision_added; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER line_decision_added BEFORE INSERT ON public.line_decision FOR EACH ROW EXECUTE FUNCTION public.tg_line_decision_added();

--
-- Name: line_decision line_decision_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER line_decision_append_only BEFORE DELETE OR UPDATE ON public.line_decision FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: line_decision line_decision_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER line_decision_no_truncate BEFORE TRUNCATE ON public.line_decision FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: line_version line_version_added; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER line_version_added BEFORE INSERT ON public.line_version FOR EACH ROW EXECUTE FUNCTION public.tg_line_version_added();

--
-- Name: line_version line_version_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER line_version_append_only BEFORE DELETE OR UPDATE ON public.line_version FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: line_version line_version_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER line_version_no_truncate BEFORE TRUNCATE ON public.line_version FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: revision_line revision_line_no_delete; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER revision_line_no_delete BEFORE DELETE ON public.revision_line FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: revision_line revision_line_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER revision_line_no_truncate BEFORE TRUNCATE ON public.revision_line FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: revision_line revision_line_row; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER revision_line_row BEFORE INSERT OR UPDATE ON public.revision_line FOR EACH ROW EXECUTE FUNCTION public.tg_revision_line_row();

--
-- Name: revision_move revision_move_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER revision_move_append_only BEFORE DELETE OR UPDATE ON public.revision_move FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: revision revision_moves; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER revision_moves BEFORE UPDATE ON public.revision FOR EACH ROW EXECUTE FUNCTION public.tg_revision_moves();

--
-- Name: sheet_chunk sheet_chunk_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER sheet_chunk_append_only BEFORE DELETE OR UPDATE ON public.sheet_chunk FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: sheet_chunk sheet_chunk_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER sheet_chunk_no_truncate BEFORE TRUNCATE ON public.sheet_chunk FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: sheet sheet_moves; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER sheet_moves BEFORE UPDATE ON public.sheet FOR EACH ROW EXECUTE FUNCTION public.tg_sheet_moves();

--
-- Name: sheet_repair sheet_repair_append_only; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER sheet_repair_append_only BEFORE DELETE OR UPDATE ON public.sheet_repair FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: sheet_repair sheet_repair_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER sheet_repair_no_truncate BEFORE TRUNCATE ON public.sheet_repair FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: source_detail source_detail_frozen; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER source_detail_frozen BEFORE INSERT OR DELETE OR UPDATE ON public.source_detail FOR EACH ROW EXECUTE FUNCTION public.tg_versioned_row();

--
-- Name: source_detail source_detail_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER source_detail_no_truncate BEFORE TRUNCATE ON public.source_detail FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: source source_never_changes; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER source_never_changes BEFORE DELETE OR UPDATE ON public.source FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: source source_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER source_no_truncate BEFORE TRUNCATE ON public.source FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: species_detail species_detail_frozen; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER species_detail_frozen BEFORE INSERT OR DELETE OR UPDATE ON public.species_detail FOR EACH ROW EXECUTE FUNCTION public.tg_versioned_row();

--
-- Name: species_detail species_detail_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER species_detail_no_truncate BEFORE TRUNCATE ON public.species_detail FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: species species_never_changes; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER species_never_changes BEFORE DELETE OR UPDATE ON public.species FOR EACH ROW EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: species species_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER species_no_truncate BEFORE TRUNCATE ON public.species FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: table_value table_value_frozen; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER table_value_frozen BEFORE INSERT OR DELETE OR UPDATE ON public.table_value FOR EACH ROW EXECUTE FUNCTION public.tg_versioned_row();

--
-- Name: table_value table_value_no_truncate; Type: TRIGGER; Schema: public; Owner: -
--

CREATE TRIGGER table_value_no_truncate BEFORE TRUNCATE ON public.table_value FOR EACH STATEMENT EXECUTE FUNCTION public.tg_forbid_change();

--
-- Name: address_change address_change_person_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.address_change
    ADD CONSTRAINT address_change_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: api_key api_key_person_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.api_key
    ADD CONSTRAINT api_key_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: audit_entry audit_entry_actor_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.audit_entry
    ADD CONSTRAINT audit_entry_actor_fkey FOREIGN KEY (actor) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: audit_entry audit_entry_api_key_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.audit_entry
    ADD CONSTRAINT audit_entry_api_key_id_fkey FOREIGN KEY (api_key_id) REFERENCES public.api_key(id) ON DELETE RESTRICT;

--
-- Name: column_plan column_plan_saved_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.column_plan
    ADD CONSTRAINT column_plan_saved_by_fkey FOREIGN KEY (saved_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: comment comment_answers_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.comment
    ADD CONSTRAINT comment_answers_fkey FOREIGN KEY (answers) REFERENCES public.comment(id) ON DELETE RESTRICT;

--
-- Name: comment comment_line_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.comment
    ADD CONSTRAINT comment_line_id_fkey FOREIGN KEY (line_id) REFERENCES public.revision_line(id) ON DELETE RESTRICT;

--
-- Name: comment comment_revision_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.comment
    ADD CONSTRAINT comment_revision_id_fkey FOREIGN KEY (revision_id) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: comment comment_written_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.comment
    ADD CONSTRAINT comment_written_by_fkey FOREIGN KEY (written_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: edition edition_published_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.edition
    ADD CONSTRAINT edition_published_by_fkey FOREIGN KEY (published_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: edition edition_withdraws_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.edition
    ADD CONSTRAINT edition_withdraws_fkey FOREIGN KEY (withdraws) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: examination examination_edition_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.examination
    ADD CONSTRAINT examination_edition_fkey FOREIGN KEY (edition) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: examination examination_revision_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.examination
    ADD CONSTRAINT examination_revision_id_fkey FOREIGN KEY (revision_id) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: finding finding_examination_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding
    ADD CONSTRAINT finding_examination_id_fkey FOREIGN KEY (examination_id) REFERENCES public.examination(id) ON DELETE RESTRICT;

--
-- Name: finding finding_line_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding
    ADD CONSTRAINT finding_line_id_fkey FOREIGN KEY (line_id) REFERENCES public.revision_line(id) ON DELETE RESTRICT;

--
-- Name: finding finding_revision_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding
    ADD CONSTRAINT finding_revision_id_fkey FOREIGN KEY (revision_id) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: finding_set_aside finding_set_aside_revision_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding_set_aside
    ADD CONSTRAINT finding_set_aside_revision_id_fkey FOREIGN KEY (revision_id) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: finding_set_aside finding_set_aside_set_aside_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding_set_aside
    ADD CONSTRAINT finding_set_aside_set_aside_by_fkey FOREIGN KEY (set_aside_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: finding finding_species_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.finding
    ADD CONSTRAINT finding_species_id_fkey FOREIGN KEY (species_id) REFERENCES public.species(id) ON DELETE RESTRICT;

--
-- Name: invitation invitation_invited_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.invitation
    ADD CONSTRAINT invitation_invited_by_fkey FOREIGN KEY (invited_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: invitation invitation_person_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.invitation
    ADD CONSTRAINT invitation_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: letter letter_from_person_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.letter
    ADD CONSTRAINT letter_from_person_fkey FOREIGN KEY (from_person) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: letter letter_to_person_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.letter
    ADD CONSTRAINT letter_to_person_fkey FOREIGN KEY (to_person) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: line_decision line_decision_decided_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.line_decision
    ADD CONSTRAINT line_decision_decided_by_fkey FOREIGN KEY (decided_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: line_decision line_decision_line_version_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.line_decision
    ADD CONSTRAINT line_decision_line_version_id_fkey FOREIGN KEY (line_version_id) REFERENCES public.line_version(id) ON DELETE RESTRICT;

--
-- Name: line_version line_version_line_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.line_version
    ADD CONSTRAINT line_version_line_id_fkey FOREIGN KEY (line_id) REFERENCES public.revision_line(id) ON DELETE RESTRICT;

--
-- Name: line_version line_version_made_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.line_version
    ADD CONSTRAINT line_version_made_by_fkey FOREIGN KEY (made_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: password_reset password_reset_person_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.password_reset
    ADD CONSTRAINT password_reset_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: person_role person_role_given_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.person_role
    ADD CONSTRAINT person_role_given_by_fkey FOREIGN KEY (given_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: person_role person_role_person_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.person_role
    ADD CONSTRAINT person_role_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: revision_line revision_line_against_version; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_against_version FOREIGN KEY (against_version) REFERENCES public.line_version(id) ON DELETE RESTRICT;

--
-- Name: revision_line revision_line_begun_in_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_begun_in_fkey FOREIGN KEY (begun_in) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: revision_line revision_line_came_from_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_came_from_fkey FOREIGN KEY (came_from) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: revision_line revision_line_published_in_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_published_in_fkey FOREIGN KEY (published_in) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: revision_line revision_line_revision_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_revision_id_fkey FOREIGN KEY (revision_id) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: revision_line revision_line_source_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_source_id_fkey FOREIGN KEY (source_id) REFERENCES public.source(id) ON DELETE RESTRICT;

--
-- Name: revision_line revision_line_species_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_line
    ADD CONSTRAINT revision_line_species_id_fkey FOREIGN KEY (species_id) REFERENCES public.species(id) ON DELETE RESTRICT;

--
-- Name: revision revision_made_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision
    ADD CONSTRAINT revision_made_by_fkey FOREIGN KEY (made_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: revision_move revision_move_moved_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_move
    ADD CONSTRAINT revision_move_moved_by_fkey FOREIGN KEY (moved_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: revision_move revision_move_revision_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision_move
    ADD CONSTRAINT revision_move_revision_id_fkey FOREIGN KEY (revision_id) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: revision revision_sheet_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.revision
    ADD CONSTRAINT revision_sheet_id_fkey FOREIGN KEY (sheet_id) REFERENCES public.sheet(id) ON DELETE RESTRICT;

--
-- Name: session session_person_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.session
    ADD CONSTRAINT session_person_id_fkey FOREIGN KEY (person_id) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: sheet_chunk sheet_chunk_sheet_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_chunk
    ADD CONSTRAINT sheet_chunk_sheet_id_fkey FOREIGN KEY (sheet_id) REFERENCES public.sheet(id) ON DELETE RESTRICT;

--
-- Name: sheet sheet_plan_confirmed_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet
    ADD CONSTRAINT sheet_plan_confirmed_by_fkey FOREIGN KEY (plan_confirmed_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: sheet_repair sheet_repair_repaired_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_repair
    ADD CONSTRAINT sheet_repair_repaired_by_fkey FOREIGN KEY (repaired_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: sheet_repair sheet_repair_sheet_id_row_number_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_repair
    ADD CONSTRAINT sheet_repair_sheet_id_row_number_fkey FOREIGN KEY (sheet_id, row_number) REFERENCES public.sheet_row(sheet_id, number) ON DELETE RESTRICT;

--
-- Name: sheet sheet_revision; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet
    ADD CONSTRAINT sheet_revision FOREIGN KEY (revision_id) REFERENCES public.revision(id) ON DELETE RESTRICT;

--
-- Name: sheet_row sheet_row_left_out_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_row
    ADD CONSTRAINT sheet_row_left_out_by_fkey FOREIGN KEY (left_out_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: sheet_row sheet_row_sheet_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet_row
    ADD CONSTRAINT sheet_row_sheet_id_fkey FOREIGN KEY (sheet_id) REFERENCES public.sheet(id) ON DELETE RESTRICT;

--
-- Name: sheet sheet_uploaded_by_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.sheet
    ADD CONSTRAINT sheet_uploaded_by_fkey FOREIGN KEY (uploaded_by) REFERENCES public.person(id) ON DELETE RESTRICT;

--
-- Name: source_detail source_detail_line_version; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.source_detail
    ADD CONSTRAINT source_detail_line_version FOREIGN KEY (line_version_id) REFERENCES public.line_version(id) ON DELETE RESTRICT;

--
-- Name: source_detail source_detail_since_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.source_detail
    ADD CONSTRAINT source_detail_since_fkey FOREIGN KEY (since) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: source_detail source_detail_source_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.source_detail
    ADD CONSTRAINT source_detail_source_id_fkey FOREIGN KEY (source_id) REFERENCES public.source(id) ON DELETE RESTRICT;

--
-- Name: source_detail source_detail_until_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.source_detail
    ADD CONSTRAINT source_detail_until_fkey FOREIGN KEY (until) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: species_detail species_detail_line_version; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species_detail
    ADD CONSTRAINT species_detail_line_version FOREIGN KEY (line_version_id) REFERENCES public.line_version(id) ON DELETE RESTRICT;

--
-- Name: species_detail species_detail_since_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species_detail
    ADD CONSTRAINT species_detail_since_fkey FOREIGN KEY (since) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: species_detail species_detail_species_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species_detail
    ADD CONSTRAINT species_detail_species_id_fkey FOREIGN KEY (species_id) REFERENCES public.species(id) ON DELETE RESTRICT;

--
-- Name: species_detail species_detail_until_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.species_detail
    ADD CONSTRAINT species_detail_until_fkey FOREIGN KEY (until) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: table_value table_value_line_version; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.table_value
    ADD CONSTRAINT table_value_line_version FOREIGN KEY (line_version_id) REFERENCES public.line_version(id) ON DELETE RESTRICT;

--
-- Name: table_value table_value_since_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.table_value
    ADD CONSTRAINT table_value_since_fkey FOREIGN KEY (since) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: table_value table_value_source_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.table_value
    ADD CONSTRAINT table_value_source_id_fkey FOREIGN KEY (source_id) REFERENCES public.source(id) ON DELETE RESTRICT;

--
-- Name: table_value table_value_species_id_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.table_value
    ADD CONSTRAINT table_value_species_id_fkey FOREIGN KEY (species_id) REFERENCES public.species(id) ON DELETE RESTRICT;

--
-- Name: table_value table_value_until_fkey; Type: FK CONSTRAINT; Schema: public; Owner: -
--

ALTER TABLE ONLY public.table_value
    ADD CONSTRAINT table_value_until_fkey FOREIGN KEY (until) REFERENCES public.edition(number) ON DELETE RESTRICT;

--
-- Name: SCHEMA public; Type: ACL; Schema: -; Owner: -
--

GRANT USAGE ON SCHEMA public TO tablewright_app;

--
-- Name: FUNCTION edition_digest(n integer); Type: ACL; Schema: public; Owner: -
--

GRANT ALL ON FUNCTION public.edition_digest(n integer) TO tablewright_app;

--
-- Name: FUNCTION hill_order(hill text); Type: ACL; Schema: public; Owner: -
--

GRANT ALL ON FUNCTION public.hill_order(hill text) TO tablewright_app;

--
-- Name: FUNCTION line_hands(of_line bigint); Type: ACL; Schema: public; Owner: -
--

GRANT ALL ON FUNCTION public.line_hands(of_line bigint) TO tablewright_app;

--
-- Name: FUNCTION open_edition(expected_previous integer, publisher uuid, edition_notes text, edition_licence text, withdrawn_edition integer, reason text); Type: ACL; Schema: public; Owner: -
--

REVOKE ALL ON FUNCTION public.open_edition(expected_previous integer, publisher uuid, edition_notes text, edition_licence text, withdrawn_edition integer, reason text) FROM PUBLIC;
GRANT ALL ON FUNCTION public.open_edition(expected_previous integer, publisher uuid, edition_notes text, edition_licence text, withdrawn_edition integer, reason text) TO tablewright_app;

--
-- Name: FUNCTION seal_edition(n integer); Type: ACL; Schema: public; Owner: -
--

REVOKE ALL ON FUNCTION public.seal_edition(n integer) FROM PUBLIC;
GRANT ALL ON FUNCTION public.seal_edition(n integer) TO tablewright_app;

--
-- Name: FUNCTION species_names(name text, synonyms text[]); Type: ACL; Schema: public; Owner: -
--

GRANT ALL ON FUNCTION public.species_names(name text, synonyms text[]) TO tablewright_app;

--
-- Name: TABLE address_change; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.address_change TO tablewright_app;

--
-- Name: COLUMN address_change.used_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(used_at) ON TABLE public.address_change TO tablewright_app;

--
-- Name: TABLE api_key; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.api_key TO tablewright_app;

--
-- Name: COLUMN api_key.withdrawn_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(withdrawn_at) ON TABLE public.api_key TO tablewright_app;

--
-- Name: COLUMN api_key.last_used_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(last_used_at) ON TABLE public.api_key TO tablewright_app;

--
-- Name: TABLE audit_entry; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.audit_entry TO tablewright_app;

--
-- Name: TABLE column_plan; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.column_plan TO tablewright_app;

--
-- Name: TABLE comment; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.comment TO tablewright_app;

--
-- Name: TABLE edition; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT ON TABLE public.edition TO tablewright_app;

--
-- Name: TABLE examination; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.examination TO tablewright_app;

--
-- Name: TABLE finding; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.finding TO tablewright_app;

--
-- Name: TABLE finding_set_aside; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.finding_set_aside TO tablewright_app;

--
-- Name: TABLE invitation; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.invitation TO tablewright_app;

--
-- Name: COLUMN invitation.used_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(used_at) ON TABLE public.invitation TO tablewright_app;

--
-- Name: TABLE letter; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.letter TO tablewright_app;

--
-- Name: COLUMN letter.sent_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(sent_at) ON TABLE public.letter TO tablewright_app;

--
-- Name: COLUMN letter.attempts; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(attempts) ON TABLE public.letter TO tablewright_app;

--
-- Name: COLUMN letter.last_error; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(last_error) ON TABLE public.letter TO tablewright_app;

--
-- Name: TABLE line_decision; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.line_decision TO tablewright_app;

--
-- Name: TABLE line_version; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.line_version TO tablewright_app;

--
-- Name: TABLE password_reset; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.password_reset TO tablewright_app;

--
-- Name: COLUMN password_reset.used_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(used_at) ON TABLE public.password_reset TO tablewright_app;

--
-- Name: TABLE person; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.person TO tablewright_app;

--
-- Name: COLUMN person.email; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(email) ON TABLE public.person TO tablewright_app;

--
-- Name: COLUMN person.name; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(name) ON TABLE public.person TO tablewright_app;

--
-- Name: COLUMN person.password_hash; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(password_hash) ON TABLE public.person TO tablewright_app;

--
-- Name: COLUMN person.switched_off_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(switched_off_at) ON TABLE public.person TO tablewright_app;

--
-- Name: TABLE person_role; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT,DELETE ON TABLE public.person_role TO tablewright_app;

--
-- Name: TABLE revision; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.revision TO tablewright_app;

--
-- Name: COLUMN revision.title; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(title) ON TABLE public.revision TO tablewright_app;

--
-- Name: COLUMN revision.summary; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(summary) ON TABLE public.revision TO tablewright_app;

--
-- Name: COLUMN revision.state; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(state) ON TABLE public.revision TO tablewright_app;

--
-- Name: COLUMN revision.round; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(round) ON TABLE public.revision TO tablewright_app;

--
-- Name: COLUMN revision.sent_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(sent_at) ON TABLE public.revision TO tablewright_app;

--
-- Name: COLUMN revision.decided_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(decided_at) ON TABLE public.revision TO tablewright_app;

--
-- Name: TABLE revision_line; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.revision_id; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(revision_id) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line."position"; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE("position") ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.against_row; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(against_row) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.against_version; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(against_version) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.state; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(state) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.published_in; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(published_in) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.begun_in; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(begun_in) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.came_from; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(came_from) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: COLUMN revision_line.came_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(came_at) ON TABLE public.revision_line TO tablewright_app;

--
-- Name: TABLE revision_move; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.revision_move TO tablewright_app;

--
-- Name: TABLE session; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.session TO tablewright_app;

--
-- Name: COLUMN session.seen_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(seen_at) ON TABLE public.session TO tablewright_app;

--
-- Name: COLUMN session.ends_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(ends_at) ON TABLE public.session TO tablewright_app;

--
-- Name: COLUMN session.ended_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(ended_at) ON TABLE public.session TO tablewright_app;

--
-- Name: TABLE sheet; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.state; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(state) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.failure; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(failure) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.dialect; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(dialect) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.heads; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(heads) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.plan; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(plan) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.plan_confirmed_by; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(plan_confirmed_by) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.plan_confirmed_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(plan_confirmed_at) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.source_choice; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(source_choice) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.settings; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(settings) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.rows_total; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(rows_total) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.rows_done; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(rows_done) ON TABLE public.sheet TO tablewright_app;

--
-- Name: COLUMN sheet.revision_id; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(revision_id) ON TABLE public.sheet TO tablewright_app;

--
-- Name: TABLE sheet_chunk; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.sheet_chunk TO tablewright_app;

--
-- Name: TABLE sheet_repair; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.sheet_repair TO tablewright_app;

--
-- Name: TABLE sheet_row; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.sheet_row TO tablewright_app;

--
-- Name: COLUMN sheet_row.cells; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(cells) ON TABLE public.sheet_row TO tablewright_app;

--
-- Name: COLUMN sheet_row.outcome; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(outcome) ON TABLE public.sheet_row TO tablewright_app;

--
-- Name: COLUMN sheet_row.problems; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(problems) ON TABLE public.sheet_row TO tablewright_app;

--
-- Name: COLUMN sheet_row.reading; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(reading) ON TABLE public.sheet_row TO tablewright_app;

--
-- Name: COLUMN sheet_row.left_out_by; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(left_out_by) ON TABLE public.sheet_row TO tablewright_app;

--
-- Name: COLUMN sheet_row.left_out_at; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(left_out_at) ON TABLE public.sheet_row TO tablewright_app;

--
-- Name: TABLE source; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.source TO tablewright_app;

--
-- Name: TABLE source_detail; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.source_detail TO tablewright_app;

--
-- Name: COLUMN source_detail.until; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(until) ON TABLE public.source_detail TO tablewright_app;

--
-- Name: TABLE species; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.species TO tablewright_app;

--
-- Name: TABLE species_detail; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.species_detail TO tablewright_app;

--
-- Name: COLUMN species_detail.until; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(until) ON TABLE public.species_detail TO tablewright_app;

--
-- Name: TABLE table_value; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT ON TABLE public.table_value TO tablewright_app;

--
-- Name: COLUMN table_value.until; Type: ACL; Schema: public; Owner: -
--

GRANT UPDATE(until) ON TABLE public.table_value TO tablewright_app;

--
-- Name: TABLE try_count; Type: ACL; Schema: public; Owner: -
--

GRANT SELECT,INSERT,DELETE,UPDATE ON TABLE public.try_count TO tablewright_app;

--
-- PostgreSQL database dump complete
--
