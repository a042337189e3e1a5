"""Figures: nouns in, pictures out. They read no file, judge nothing, and open no window."""

from safeamp.figures.gallery import (
    FIRST,
    FURTHER,
    Gallery,
    LeftOut,
    bass_pictures,
    histograms_of,
    pictures_of,
    plane_pictures,
)
from safeamp.figures.look import NotDrawnError, Picture, picture, rendered
from safeamp.figures.svg import svg_text

__all__ = [
    "FIRST",
    "FURTHER",
    "Gallery",
    "LeftOut",
    "NotDrawnError",
    "Picture",
    "bass_pictures",
    "histograms_of",
    "picture",
    "pictures_of",
    "plane_pictures",
    "rendered",
    "svg_text",
]
