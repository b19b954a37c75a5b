"""Our own look: dark, light, and sixteen colours; each with high contrast and one emphasis."""

from __future__ import annotations

from collections.abc import Mapping

from textual.theme import Theme

DARK = Theme(
    name="gaugelog-dark",
    primary="#e0a15e",
    secondary="#86b6b4",
    accent="#e0a15e",
    success="#86c98a",
    warning="#efc75e",
    error="#ff8b7b",
    foreground="#ece8e1",
    background="#15181b",
    surface="#15181b",
    panel="#23282d",
    dark=True,
    variables={
        "text-muted": "#a9a69f",
        "text-success": "#86c98a",
        "text-warning": "#efc75e",
        "text-error": "#ff8b7b",
        "block-cursor-background": "#e0a15e",
        "block-cursor-foreground": "#15181b",
        "border": "#e0a15e",
        "border-blurred": "#4a5157",
    },
)
LIGHT = Theme(
    name="gaugelog-light",
    primary="#8a4b0f",
    secondary="#2b5f63",
    accent="#8a4b0f",
    success="#1c6428",
    warning="#6d5200",
    error="#a1201a",
    foreground="#1b1e21",
    background="#fbf9f5",
    surface="#fbf9f5",
    panel="#ebe6dc",
    dark=False,
    variables={
        "text-muted": "#5b5850",
        "text-success": "#1c6428",
        "text-warning": "#6d5200",
        "text-error": "#a1201a",
        "block-cursor-background": "#8a4b0f",
        "block-cursor-foreground": "#fbf9f5",
        "border": "#8a4b0f",
        "border-blurred": "#b5afa2",
    },
)
SIXTEEN = Theme(
    name="gaugelog-16",
    ansi=True,
    primary="ansi_yellow",
    secondary="ansi_cyan",
    accent="ansi_yellow",
    success="ansi_green",
    warning="ansi_yellow",
    error="ansi_red",
    foreground="ansi_default",
    background="ansi_default",
    surface="ansi_default",
    panel="ansi_default",
    boost="ansi_default",
    variables={
        "ansi-background": "ansi_black",
        "ansi-foreground": "ansi_white",
        "text-muted": "ansi_default",
        "input-cursor-background": "ansi_white",
        "input-cursor-foreground": "ansi_black",
        "input-selection-background": "ansi_cyan",
        "input-selection-foreground": "ansi_black",
        "screen-selection-background": "ansi_cyan",
        "screen-selection-foreground": "ansi_black",
        "block-cursor-background": "ansi_yellow",
        "block-cursor-foreground": "ansi_black",
        "border": "ansi_yellow",
        "border-blurred": "ansi_default",
        "footer-key-foreground": "ansi_yellow",
    },
)
THEMES = (DARK, LIGHT, SIXTEEN)

VARIABLE = "GAUGELOG_THEME"
"""The variable that names the look: dark, light or 16."""


def first_theme(environment: Mapping[str, str]) -> str:
    """The look to begin with: the one named, else what the terminal says that it can show."""
    named = f"gaugelog-{environment.get(VARIABLE, '').strip().casefold()}"
    if named in {theme.name for theme in THEMES}:
        return named
    rich_terminal = environment.get("COLORTERM", "").casefold() in {"truecolor", "24bit"}
    if rich_terminal or "256" in environment.get("TERM", ""):
        return DARK.name
    return SIXTEEN.name


def next_theme(current: str) -> str:
    """The look after this one, in turn."""
    names = [theme.name for theme in THEMES]
    return names[(names.index(current) + 1) % len(names)] if current in names else names[0]
