import { type Kysely, sql } from "kysely";

/*
 * One append-only table, read "as of" an edition. A versioned row says in which edition it came in (since) and in which
 * it went out (until, null = still standing); edition n is the rows with since <= n and (until is null or until > n).
 * No row is copied per edition, so an edition costs what it changed.
 *
 * Freezing is the database's own: rows come in only while an edition is open, and an edition is open only inside the
 * transaction that publishes it. The application role has no INSERT on edition at all; open_edition and seal_edition
 * are the only doors, and seal_edition holds what they let through against the decisions (see the review migration).
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table edition (
      number integer primary key,
      state text not null,
      published_at timestamptz not null,
      published_by uuid not null references person on delete restrict,
      notes text not null,
      licence text not null,
      withdraws integer references edition on delete restrict,
      withdrawal_reason text,
      species_count integer,
      value_count integer,
      came integer,
      changed integer,
      went integer,
      digest bytea,
      previous_digest bytea,
      constraint edition_number_positive check (number > 0),
      constraint edition_state_known check (state in ('open', 'sealed')),
      constraint edition_sealed_is_whole check (state = 'open' or (species_count is not null and value_count is not null and came is not null and changed is not null and went is not null and octet_length(digest) = 32)),
      constraint edition_previous_digest check ((number = 1) = (previous_digest is null)),
      constraint edition_withdrawal_has_reason check ((withdraws is null) = (withdrawal_reason is null) and (withdrawal_reason is null or length(btrim(withdrawal_reason)) > 0)),
      constraint edition_withdraws_an_older check (withdraws < number),
      constraint edition_withdrawn_once unique (withdraws)
    );
    create unique index edition_one_open on edition (state) where state = 'open';
    comment on table edition is 'Numbered editions without gaps. Open only inside the transaction that publishes it; sealed for good at its end.';
    comment on column edition.digest is 'SHA-256 over the row hashes in order, the previous digest, the number and the licence (app/editions/digest.ts).';
    comment on column edition.withdraws is 'The older edition that this one withdraws; its bytes stay readable.';
    comment on column edition.came is 'How many values came in with this edition, net.';
    comment on column edition.licence is 'SPDX licence identifier.';

    create table species (
      id text primary key default 'sp_' || replace(gen_random_uuid()::text, '-', ''),
      hill text not null,
      composition jsonb not null,
      charge integer not null,
      phase text not null,
      made_at timestamptz not null default now(),
      constraint species_id_form check (id ~ '^sp_[0-9a-z]{8,40}$'),
      constraint species_phase_known check (phase in ('g', 'l', 's', 'cr', 'am', 'vit', 'aq')),
      constraint species_composition_is_object check (jsonb_typeof(composition) = 'object')
    );
    create index species_hill on species (hill, charge, phase);
    comment on table species is 'What a species is made of: never changes. What it is called is species_detail.';
    comment on column species.hill is 'Formula in Hill order, exact fractions, without the charge.';
    comment on column species.composition is 'Element symbol (D and T apart from H) to count of atoms.';
    create trigger species_never_changes before update or delete on species for each row execute function tg_forbid_change();
    create trigger species_no_truncate before truncate on species for each statement execute function tg_forbid_change();

    create table source (
      id text primary key default 'src_' || replace(gen_random_uuid()::text, '-', ''),
      made_at timestamptz not null default now(),
      constraint source_id_form check (id ~ '^src_[0-9a-z]{8,40}$')
    );
    comment on table source is 'A frozen identity for a source; its citation is versioned in source_detail.';
    create trigger source_never_changes before update or delete on source for each row execute function tg_forbid_change();
    create trigger source_no_truncate before truncate on source for each statement execute function tg_forbid_change();

    create table species_detail (
      id bigint generated always as identity primary key,
      species_id text not null references species on delete restrict,
      key text collate "C" not null,
      printed text not null,
      label text,
      name text not null,
      cas text,
      inchikey text,
      synonyms text[] not null default '{}',
      line_version_id bigint not null,
      row_hash bytea not null,
      since integer not null references edition on delete restrict,
      until integer references edition on delete restrict,
      constraint species_detail_range check (until is null or until > since),
      constraint species_detail_hash_is_sha256 check (octet_length(row_hash) = 32),
      constraint species_detail_key_form check (key !~ '[[:space:]]' and length(key) between 1 and 300),
      constraint species_detail_label_form check (label is null or label ~ '^[^[:space:]]+$'),
      constraint species_detail_cas_form check (cas is null or cas ~ '^[0-9]{2,7}-[0-9]{2}-[0-9]$'),
      constraint species_detail_inchikey_form check (inchikey is null or inchikey ~ '^[A-Z]{14}-[A-Z]{10}-[A-Z]$'),
      constraint species_detail_one_at_a_time exclude using gist (species_id with =, int4range(since, until) with &&),
      constraint species_detail_key_once_an_edition exclude using gist (key with =, int4range(since, until) with &&)
    );
    create index species_detail_since on species_detail (since);
    create index species_detail_until on species_detail (until);
    create index species_detail_cas on species_detail (cas) where cas is not null;
    comment on table species_detail is 'What a species is called, by edition. The key is unique in an edition.';
    comment on column species_detail.label is 'The form of a solid or the name of an isomer where formula, charge and phase leave more than one substance; null where they do not.';
    comment on column species_detail.line_version_id is 'The proposal, as accepted, that brought this row.';

    create table source_detail (
      id bigint generated always as identity primary key,
      source_id text collate "C" not null references source on delete restrict,
      citation jsonb not null,
      doi text,
      kind text not null,
      notice text,
      line_version_id bigint not null,
      row_hash bytea not null,
      since integer not null references edition on delete restrict,
      until integer references edition on delete restrict,
      constraint source_detail_range check (until is null or until > since),
      constraint source_detail_hash_is_sha256 check (octet_length(row_hash) = 32),
      constraint source_detail_kind_known check (kind in ('measurement', 'evaluation', 'calculation', 'estimate')),
      constraint source_detail_citation_is_object check (jsonb_typeof(citation) = 'object'),
      constraint source_detail_one_at_a_time exclude using gist (source_id with =, int4range(since, until) with &&)
    );
    create index source_detail_since on source_detail (since);
    create index source_detail_until on source_detail (until);
    comment on table source_detail is 'The citation of a source, by edition. citation is CSL-JSON.';
    comment on column source_detail.notice is 'A retraction, an erratum or another warning shown beside the source; null without one.';

    create table table_value (
      id bigint generated always as identity primary key,
      species_id text not null references species on delete restrict,
      property text collate "C" not null,
      value numeric not null,
      uncertainty numeric,
      uncertainty_kind text,
      coverage_factor numeric,
      temperature numeric not null,
      standard_pressure numeric not null,
      basis text,
      origin text not null,
      method text,
      given_text text not null,
      given_unit text not null,
      given_note text,
      remark text,
      source_id text not null references source on delete restrict,
      line_version_id bigint not null,
      row_hash bytea not null,
      since integer not null references edition on delete restrict,
      until integer references edition on delete restrict,
      constraint table_value_range check (until is null or until > since),
      constraint table_value_hash_is_sha256 check (octet_length(row_hash) = 32),
      constraint table_value_property_known check (property in ('enthalpyOfFormation', 'entropy', 'gibbsEnergyOfFormation', 'heatCapacity', 'enthalpyIncrement')),
      constraint table_value_is_a_number check (value not in ('NaN', 'Infinity', '-Infinity')),
      constraint table_value_uncertainty_whole check ((uncertainty is null) = (uncertainty_kind is null)),
      constraint table_value_uncertainty_not_negative check (uncertainty is null or (uncertainty >= 0 and uncertainty not in ('NaN', 'Infinity'))),
      constraint table_value_uncertainty_kind_known check (uncertainty_kind in ('exact', 'standard', 'expanded', 'unstated')),
      constraint table_value_exact_is_zero check (uncertainty_kind is distinct from 'exact' or uncertainty = 0),
      constraint table_value_coverage_factor check ((coverage_factor is not null) = (uncertainty_kind is not distinct from 'expanded') and (coverage_factor is null or coverage_factor > 0)),
      constraint table_value_temperature_positive check (temperature > 0),
      constraint table_value_pressure_positive check (standard_pressure > 0),
      constraint table_value_basis_known check (basis in ('molality', 'concentration')),
      constraint table_value_origin_known check (origin in ('stated', 'derived')),
      constraint table_value_one_at_a_time exclude using gist (species_id with =, property with =, int4range(since, until) with &&)
    );
    create unique index table_value_one_standing on table_value (species_id, property) where until is null;
    create index table_value_since on table_value (since);
    create index table_value_until on table_value (until);
    create index table_value_source on table_value (source_id);
    comment on table table_value is 'The values, by edition. The scale of numeric keeps the digits: 205.10 is not 205.1.';
    comment on column table_value.value is 'In the unit of the property: kJ/mol for enthalpyOfFormation, gibbsEnergyOfFormation and enthalpyIncrement; J/(mol K) for entropy and heatCapacity.';
    comment on column table_value.uncertainty is 'In the unit of the value, as given; null = none stated.';
    comment on column table_value.uncertainty_kind is 'exact (by convention), standard (k = 1), expanded (with its coverage factor), unstated (counted as k = 2); null = none stated.';
    comment on column table_value.temperature is 'In kelvin.';
    comment on column table_value.standard_pressure is 'In pascal.';
    comment on column table_value.basis is 'Standard state of a solute as the source said it: molality (1 mol/kg) or concentration (1 mol/L); null for other phases or when not said.';
    comment on column table_value.given_text is 'What the sheet said, to the letter.';
    comment on column table_value.given_unit is 'The unit the sheet used.';
    comment on column table_value.given_note is 'The conversion that was applied, null when there was none.';
    comment on column table_value.remark is 'A remark of the source that checks heed, such as a constraint its compilers relaxed; null without one.';
    comment on column table_value.row_hash is 'SHA-256 of the RFC 8785 JSON of the published fields (app/editions/digest.ts).';

    -- A versioned row comes in with the open edition and goes out once, with a later open edition. Nothing else moves.
    create function tg_versioned_row() returns trigger language plpgsql as $$
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
    comment on function tg_versioned_row() is 'Keeps editions frozen. TW002: came in outside its edition; TW003: changed otherwise than going out; TW001: removed.';

    create trigger species_detail_frozen before insert or update or delete on species_detail for each row execute function tg_versioned_row();
    create trigger source_detail_frozen before insert or update or delete on source_detail for each row execute function tg_versioned_row();
    create trigger table_value_frozen before insert or update or delete on table_value for each row execute function tg_versioned_row();
    create trigger species_detail_no_truncate before truncate on species_detail for each statement execute function tg_forbid_change();
    create trigger source_detail_no_truncate before truncate on source_detail for each statement execute function tg_forbid_change();
    create trigger table_value_no_truncate before truncate on table_value for each statement execute function tg_forbid_change();

    -- An edition is born open, with the next number and a time that does not go back, and changes once: to sealed.
    create function tg_edition_row() returns trigger language plpgsql as $$
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
    create trigger edition_row before insert or update or delete on edition for each row execute function tg_edition_row();
    create trigger edition_no_truncate before truncate on edition for each statement execute function tg_forbid_change();

    create function tg_edition_is_sealed_at_commit() returns trigger language plpgsql as $$
    begin
      if exists (select from edition where state = 'open') then
        raise exception 'An edition is open only inside the transaction that publishes it.' using errcode = 'TW004';
      end if;
      return null;
    end
    $$;
    create constraint trigger edition_is_sealed_at_commit after insert or update on edition
      deferrable initially deferred for each row execute function tg_edition_is_sealed_at_commit();

    grant select on edition, species, source, species_detail, source_detail, table_value to tablewright_app;
    grant insert on species, source, species_detail, source_detail, table_value to tablewright_app;
    grant update (until) on species_detail, source_detail, table_value to tablewright_app;
  `.execute(db);
}
