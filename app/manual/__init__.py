"""The offline manual: pages in our own words, lists made from the program's own declarations."""
