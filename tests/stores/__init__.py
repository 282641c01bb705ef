"""Tests of the store definitions and of the networks made of them."""
