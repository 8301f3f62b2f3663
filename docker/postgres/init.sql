-- Run once by psql, as the superuser of a new cluster: the five roles and their database.
-- The passwords come from the environment: OWNER_PASSWORD, API_PASSWORD, WORKER_PASSWORD,
-- COUNTER_PASSWORD, READER_PASSWORD. What each role may touch is granted by the migrations.
\set ON_ERROR_STOP on
\getenv owner_password OWNER_PASSWORD
\getenv api_password API_PASSWORD
\getenv worker_password WORKER_PASSWORD
\getenv counter_password COUNTER_PASSWORD
\getenv reader_password READER_PASSWORD

SET password_encryption = 'scram-sha-256';
CREATE ROLE owner LOGIN PASSWORD :'owner_password';
CREATE ROLE api LOGIN PASSWORD :'api_password';
CREATE ROLE worker LOGIN PASSWORD :'worker_password';
CREATE ROLE counter LOGIN PASSWORD :'counter_password';
CREATE ROLE reader LOGIN PASSWORD :'reader_password';

-- Planning the writer's function natively costs 600 ms a booking and saves nothing.
ALTER ROLE owner SET jit = off;
ALTER ROLE api SET jit = off;
ALTER ROLE worker SET jit = off;
ALTER ROLE counter SET jit = off;
ALTER ROLE reader SET jit = off;

ALTER ROLE owner SET lock_timeout = '10s';
ALTER ROLE owner SET search_path = public;
ALTER ROLE api SET lock_timeout = '5s';
ALTER ROLE api SET statement_timeout = '30s';
ALTER ROLE api SET idle_in_transaction_session_timeout = '30s';
ALTER ROLE api SET search_path = public;
ALTER ROLE worker SET lock_timeout = '5s';
ALTER ROLE worker SET statement_timeout = '5min';
ALTER ROLE worker SET idle_in_transaction_session_timeout = '30s';
ALTER ROLE worker SET search_path = public;
ALTER ROLE counter SET lock_timeout = '2s';
ALTER ROLE counter SET statement_timeout = '5s';
ALTER ROLE counter SET idle_in_transaction_session_timeout = '5s';
ALTER ROLE counter SET search_path = public;
ALTER ROLE reader SET default_transaction_read_only = on;
ALTER ROLE reader SET statement_timeout = '30min';
ALTER ROLE reader SET idle_in_transaction_session_timeout = '5min';
ALTER ROLE reader SET search_path = public;

CREATE DATABASE foldwell OWNER owner TEMPLATE template0
  ENCODING 'UTF8' LC_COLLATE 'C.UTF-8' LC_CTYPE 'C.UTF-8';
REVOKE ALL ON DATABASE foldwell FROM PUBLIC;
GRANT CONNECT ON DATABASE foldwell TO api, worker, counter, reader;
REVOKE CONNECT ON DATABASE postgres FROM PUBLIC;
REVOKE CONNECT ON DATABASE template1 FROM PUBLIC;

\connect foldwell
REVOKE ALL ON SCHEMA public FROM PUBLIC;
CREATE EXTENSION btree_gist;
