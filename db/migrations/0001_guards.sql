-- Versions never change. They go only with what they belong to: a cascade runs inside another trigger.
create function refuse_change() returns trigger language plpgsql as $$
begin
  if tg_op = 'DELETE' and pg_trigger_depth() > 1 then
    return old;
  end if;
  raise exception '% rows are immutable', tg_table_name using errcode = 'restrict_violation';
end $$;
--> statement-breakpoint
create trigger kernel_versions_immutable before update or delete on kernel_versions for each row execute function refuse_change();
--> statement-breakpoint
create trigger fabric_versions_immutable before update or delete on fabric_versions for each row execute function refuse_change();
--> statement-breakpoint
create trigger audit_entries_immutable before update or delete on audit_entries for each row execute function refuse_change();
--> statement-breakpoint
-- A kept mapping may be renamed and archived, nothing else.
create function refuse_mapping_change() returns trigger language plpgsql as $$
begin
  if to_jsonb(new) - 'name' - 'archived_at' is distinct from to_jsonb(old) - 'name' - 'archived_at' then
    raise exception 'a kept mapping is immutable but for its name and archive mark' using errcode = 'restrict_violation';
  end if;
  return new;
end $$;
--> statement-breakpoint
create trigger mappings_immutable before update on mappings for each row execute function refuse_mapping_change();
--> statement-breakpoint
-- A workspace keeps an owner. Deferred to the commit, so that two owners may swap roles in one transaction; the lock
-- on the workspace makes two transactions that each remove one of two owners wait for one another.
create function keep_an_owner() returns trigger language plpgsql as $$
begin
  if old.role <> 'owner' then
    return null;
  end if;
  perform 1 from workspaces where id = old.workspace_id for update;
  if found and not exists (select 1 from members where workspace_id = old.workspace_id and role = 'owner') then
    raise exception 'a workspace keeps at least one owner' using errcode = 'restrict_violation', constraint = 'members_keep_an_owner';
  end if;
  return null;
end $$;
--> statement-breakpoint
create constraint trigger members_keep_an_owner after update or delete on members
  deferrable initially deferred for each row execute function keep_an_owner();
