# The service and what it needs, pinned by their sums, run by a user who owns nothing and writes nothing.
ARG PYTHON=python:3.12-slim

FROM ${PYTHON} AS build
WORKDIR /build
ENV PIP_NO_CACHE_DIR=1 PIP_DISABLE_PIP_VERSION_CHECK=1
RUN python -m venv --without-pip /opt/catspaw
COPY .requirements.lock ./
RUN pip --python /opt/catspaw install --require-hashes --only-binary :all: -r .requirements.lock
COPY pyproject.toml README.md ./
COPY service service
COPY schemas schemas
RUN pip --python /opt/catspaw install --no-deps .
RUN find /opt/catspaw -name tests -type d -prune -exec rm -rf {} +
RUN /opt/catspaw/bin/catspaw check > /dev/null

FROM ${PYTHON}
COPY --from=build /opt/catspaw /opt/catspaw
ENV PATH=/opt/catspaw/bin:$PATH PYTHONDONTWRITEBYTECODE=1 CATSPAW_BIND=0.0.0.0:8660
WORKDIR /
USER 65534:65534
EXPOSE 8660
STOPSIGNAL SIGTERM
HEALTHCHECK --interval=10s --timeout=5s --start-period=10s CMD ["python", "-c", "import urllib.request as r; r.urlopen('http://127.0.0.1:8660/readyz', timeout=4)"]
CMD ["catspaw", "serve"]
