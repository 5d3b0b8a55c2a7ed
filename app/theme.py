"""Colours and type, light and dark: one family, few colours, all our own."""

from dataclasses import dataclass
from pathlib import Path

from PySide6.QtGui import QColor, QFont, QFontDatabase, QPalette
from PySide6.QtWidgets import QApplication

FAMILY = "DejaVu Sans"
"""The one type family: it has the Greek letters and figures of one width, and matplotlib carries it."""


@dataclass(frozen=True)
class Theme:
    """Colours as #rrggbb. `traces` are for lines that must be told apart beside their dashes."""

    name: str
    paper: str
    panel: str
    raised: str
    ink: str
    faint: str
    rule: str
    metal: str
    metal_edge: str
    accent: str
    accent_soft: str
    caution: str
    traces: tuple[str, str, str, str]


LIGHT = Theme(
    name="light",
    paper="#fbfaf7",
    panel="#f2f0eb",
    raised="#ffffff",
    ink="#23282d",
    faint="#666c72",
    rule="#d8d4cb",
    metal="#e3e5e4",
    metal_edge="#3a4046",
    accent="#1c5d6b",
    accent_soft="#d3e4e6",
    caution="#8a4b12",
    traces=("#23282d", "#1c6d7d", "#9a4a2c", "#5c5190"),
)
DARK = Theme(
    name="dark",
    paper="#1d2023",
    panel="#25292d",
    raised="#2d3236",
    ink="#e7e4dd",
    faint="#a0a5a9",
    rule="#3d4247",
    metal="#474d52",
    metal_edge="#c9cbca",
    accent="#7cc0ca",
    accent_soft="#2b4a50",
    caution="#e0a468",
    traces=("#e7e4dd", "#74bcc8", "#e09a78", "#aea4e0"),
)


def load_type() -> None:
    """Register the type family from matplotlib's own files, so that no system font is needed."""
    import matplotlib

    folder = Path(matplotlib.get_data_path()) / "fonts" / "ttf"
    for face in ("DejaVuSans.ttf", "DejaVuSans-Bold.ttf", "DejaVuSans-Oblique.ttf"):
        QFontDatabase.addApplicationFont(str(folder / face))


def text_font(points: float = 9.5, bold: bool = False) -> QFont:
    font = QFont(FAMILY)
    font.setPointSizeF(points)
    font.setBold(bold)
    return font


def system_theme(app: QApplication) -> Theme:
    """Light or dark as the desktop has it."""
    return DARK if app.palette().color(QPalette.ColorRole.Window).lightness() < 128 else LIGHT


def palette_of(theme: Theme) -> QPalette:
    """The widget palette of a theme."""
    role, palette = QPalette.ColorRole, QPalette()
    for which, colour in (
        (role.Window, theme.panel),
        (role.Base, theme.raised),
        (role.AlternateBase, theme.paper),
        (role.Button, theme.panel),
        (role.ToolTipBase, theme.raised),
        (role.Text, theme.ink),
        (role.WindowText, theme.ink),
        (role.ButtonText, theme.ink),
        (role.ToolTipText, theme.ink),
        (role.PlaceholderText, theme.faint),
        (role.Highlight, theme.accent_soft),
        (role.HighlightedText, theme.ink),
        (role.Link, theme.accent),
        (role.Mid, theme.rule),
        (role.Light, theme.raised),
        (role.Dark, theme.rule),
        (role.Shadow, theme.rule),
    ):
        palette.setColor(which, QColor(colour))
    for which in (role.Text, role.WindowText, role.ButtonText):
        palette.setColor(QPalette.ColorGroup.Disabled, which, QColor(theme.faint))
    return palette


def style_sheet(theme: Theme) -> str:
    """The few rules that the palette alone cannot say."""
    return f"""
        QMainWindow, QDialog {{ background: {theme.panel}; }}
        QSplitter::handle {{ background: {theme.rule}; }}
        QSplitter::handle:horizontal {{ width: 1px; }}
        QSplitter::handle:vertical {{ height: 1px; }}
        QMenuBar {{ background: {theme.panel}; color: {theme.ink}; border-bottom: 1px solid {theme.rule}; }}
        QMenuBar::item:selected, QMenu::item:selected {{ background: {theme.accent_soft}; color: {theme.ink}; }}
        QMenu {{ background: {theme.raised}; color: {theme.ink}; border: 1px solid {theme.rule}; }}
        QMenu::item:disabled {{ color: {theme.faint}; }}
        QToolTip {{ background: {theme.raised}; color: {theme.ink}; border: 1px solid {theme.rule}; padding: 3px; }}
        QStatusBar {{ background: {theme.panel}; color: {theme.faint}; border-top: 1px solid {theme.rule}; }}
        QStatusBar::item {{ border: none; }}
        QToolButton#foldHead {{ border: none; padding: 5px 10px; text-align: left; color: {theme.ink};
            background: {theme.panel}; font-weight: bold; }}
        QToolButton#foldHead:hover, QToolButton#foldHead:focus {{ background: {theme.accent_soft}; }}
        QDialogButtonBox {{ dialogbuttonbox-buttons-have-icons: 0; }}
        QTextBrowser {{ background: {theme.paper}; color: {theme.ink}; border: none; }}
    """


def apply_theme(app: QApplication, theme: Theme) -> None:
    """Dress the whole program; widgets that paint themselves have `set_theme` beside this."""
    app.setStyle("Fusion")
    app.setPalette(palette_of(theme))
    app.setFont(text_font())
    app.setStyleSheet(style_sheet(theme))
