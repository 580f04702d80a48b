import { type Kysely, sql } from "kysely";

/*
 * A table of tens of thousands of species is filtered, sorted and searched while somebody types. Each index answers one
 * question that would otherwise read every row: the newest values of some species, one property in order, a part of a
 * name, the atoms of a formula. `pg_trgm` is a trusted extension, so the owner of the database may add it.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create extension if not exists pg_trgm;

    create function species_names(name text, synonyms text[]) returns text
      language sql immutable strict parallel safe as $$ select lower(name || E'\n' || array_to_string(synonyms, E'\n')) $$;
    comment on function species_names(text, text[]) is 'Everything a species is called, in small letters, one name a line: what a search by name looks in.';

    create function hill_order(hill text) returns text language sql immutable strict parallel safe as $$
      select regexp_replace(regexp_replace(regexp_replace(hill, '([A-Z][a-z]?)(?![a-z0-9])', '\\11', 'g'),
                                           '([0-9]+)', '000\\1', 'g'),
                            '0*([0-9]{4})(?![0-9])', '\\1', 'g') collate "C"
    $$;
    comment on function hill_order(text) is 'A formula in Hill order with every count written in four digits, so that C2H6 stands before C10H8 when compared by bytes.';

    create index species_in_hill_order on species (hill_order(hill) collate "C", id);
    create index species_elements on species using gin (composition);
    create index species_detail_species on species_detail (species_id);
    create index species_detail_key on species_detail (key);
    create index species_detail_key_part on species_detail using gin (lower(key) gin_trgm_ops);
    create index species_detail_name_part on species_detail using gin (species_names(name, synonyms) gin_trgm_ops);
    create index table_value_species on table_value (species_id, property);
    create index table_value_in_order on table_value (property, value);

    grant execute on function species_names(text, text[]), hill_order(text) to tablewright_app;
  `.execute(db);
}
