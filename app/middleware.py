"""What every request passes: a size limit, a check of where a post comes from, and headers on every response.

Plain ASGI classes. Pages are stateless and carry no cookie, so the check of origin guards only against another
site making a reader's browser work.
"""

from __future__ import annotations

from urllib.parse import urlsplit

from starlette.datastructures import Headers, MutableHeaders
from starlette.responses import PlainTextResponse
from starlette.types import ASGIApp, Message, Receive, Scope, Send

_HEADERS = {
    "Content-Security-Policy": (
        "default-src 'self'; object-src 'none'; base-uri 'none'; frame-ancestors 'none'; form-action 'self'"
    ),
    "X-Content-Type-Options": "nosniff",
    "Referrer-Policy": "same-origin",
    "Cross-Origin-Opener-Policy": "same-origin",
}


class SecurityHeaders:
    """Adds the headers that keep a page from loading or being loaded by anything foreign."""

    def __init__(self, app: ASGIApp) -> None:
        self.app = app

    async def __call__(self, scope: Scope, receive: Receive, send: Send) -> None:
        """Serve one request with the headers added."""
        if scope["type"] != "http":
            await self.app(scope, receive, send)
            return

        async def with_headers(message: Message) -> None:
            if message["type"] == "http.response.start":
                headers = MutableHeaders(scope=message)
                for name, value in _HEADERS.items():
                    headers.setdefault(name, value)
            await send(message)

        await self.app(scope, receive, with_headers)


class SameOrigin:
    """Refuses posts that a browser sends on behalf of another site."""

    def __init__(self, app: ASGIApp) -> None:
        self.app = app

    async def __call__(self, scope: Scope, receive: Receive, send: Send) -> None:
        """Serve one request, or refuse it with 403."""
        if scope["type"] == "http" and scope["method"] not in ("GET", "HEAD", "OPTIONS"):
            headers = Headers(scope=scope)
            if _is_foreign(headers):
                response = PlainTextResponse("This request came from another site.", 403)
                await response(scope, receive, send)
                return
        await self.app(scope, receive, send)


def _is_foreign(headers: Headers) -> bool:
    site = headers.get("sec-fetch-site")
    if site is not None:
        return site not in ("same-origin", "none")
    origin = headers.get("origin")
    return origin is not None and urlsplit(origin).netloc != headers.get("host")


class BodyLimit:
    """Refuses bodies that are larger than a limit, by their header and while they arrive."""

    def __init__(self, app: ASGIApp, limit_bytes: int) -> None:
        self.app = app
        self.limit_bytes = limit_bytes

    async def __call__(self, scope: Scope, receive: Receive, send: Send) -> None:
        """Serve one request, or refuse it with 413."""
        if scope["type"] != "http":
            await self.app(scope, receive, send)
            return
        declared = Headers(scope=scope).get("content-length", "0")
        if not declared.isdigit() or int(declared) > self.limit_bytes:
            await self._refusal()(scope, receive, send)
            return
        chunks: list[Message] = []
        size = 0
        while True:
            message = await receive()
            chunks.append(message)
            size += len(message.get("body", b""))
            if size > self.limit_bytes:
                await self._refusal()(scope, receive, send)
                return
            if not message.get("more_body", False):
                break

        async def replay() -> Message:
            return chunks.pop(0) if chunks else await receive()

        await self.app(scope, replay, send)

    def _refusal(self) -> PlainTextResponse:
        text = (
            f'{{"type":"about:blank","title":"The request is too large","status":413,'
            f'"detail":"At most {self.limit_bytes} bytes are read.","errors":[]}}'
        )
        return PlainTextResponse(text, 413, media_type="application/problem+json")
