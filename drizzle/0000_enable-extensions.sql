-- Exclusion constraints compare plain columns beside ranges.
create extension if not exists btree_gist;
