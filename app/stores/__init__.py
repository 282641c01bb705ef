"""Stores as people describe them: definitions, their checks, and the networks made of them."""

from app.stores.definition import Limit, StoreDefinition
from app.stores.network_of import PlacedItem, StoreNetwork
from app.stores.reading import definition_document, fingerprint, read_definition
from app.stores.rise_time import store_network
from app.stores.sample_cases import SampleCase, sample_case, sample_cases
from app.stores.store_types import StoreType, store_type, store_types

__all__ = [
    "Limit",
    "PlacedItem",
    "SampleCase",
    "StoreDefinition",
    "StoreNetwork",
    "StoreType",
    "definition_document",
    "fingerprint",
    "read_definition",
    "sample_case",
    "sample_cases",
    "store_network",
    "store_type",
    "store_types",
]
