"""The pages: what people see. They hold no arithmetic; all answers come from ``answers``."""

from __future__ import annotations

from fastapi import APIRouter

from app.web import home_pages, pattern_pages, reference_pages, store_pages
from app.web.error_pages import handlers

router = APIRouter()
for pages in (home_pages, store_pages, reference_pages, pattern_pages):
    router.include_router(pages.router)

__all__ = ["handlers", "router"]
