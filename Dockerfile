# Builds the service from this checkout:  docker build -t crossbank .
# Any image with Python 3.11 or later and pip will do as a base.
ARG BASE=python:3.12-slim-bookworm

FROM ${BASE} AS build
WORKDIR /src
RUN python3 -m venv /opt/crossbank
COPY pyproject.toml README.md LICENSE ./
COPY client client
COPY service service
RUN /opt/crossbank/bin/pip install --no-cache-dir '.[service]'

FROM ${BASE}
COPY --from=build /opt/crossbank /opt/crossbank
RUN useradd --uid 10001 --no-create-home --home-dir /nonexistent crossbank
USER 10001
ENV PATH=/opt/crossbank/bin:$PATH \
    PYTHONUNBUFFERED=1 \
    PYTHONDONTWRITEBYTECODE=1
EXPOSE 8000
HEALTHCHECK --interval=10s --timeout=5s --start-period=60s --retries=3 \
    CMD ["python3", "-c", "import urllib.request as r; r.urlopen('http://127.0.0.1:8000/health/live', timeout=4)"]
STOPSIGNAL SIGTERM
CMD ["crossbank-service", "serve", "--host", "0.0.0.0", "--port", "8000"]
