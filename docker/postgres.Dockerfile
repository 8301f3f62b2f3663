FROM postgres:15-bookworm
COPY docker/postgres/init.sql /docker-entrypoint-initdb.d/init.sql
CMD ["postgres", "-c", "synchronous_commit=on"]
