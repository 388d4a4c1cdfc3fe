FROM python:3.12-slim
WORKDIR /opt/catspaw
COPY pyproject.toml README.md ./
COPY service service
COPY schemas schemas
RUN pip install --no-cache-dir .
USER nobody
EXPOSE 8660
HEALTHCHECK CMD ["python", "-c", "import urllib.request as r; r.urlopen('http://127.0.0.1:8660/healthz', timeout=3)"]
CMD ["catspaw", "serve", "--bind", "0.0.0.0:8660"]
