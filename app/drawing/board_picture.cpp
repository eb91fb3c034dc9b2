// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/board_scene.h"
#include "drawing/words.h"
#include "limits/judge.h"
#include "units/text.h"

#include <QFontMetricsF>
#include <QStringList>
#include <QTransform>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace headroom::drawing {

namespace {

using Scene = BoardPicture::Scene;

constexpr double narrowest = 40.0, easy = 48.0, widest = 66.0; ///< columns
constexpr double classWidth = 5.0;      ///< gap and letter of the class, in units
constexpr double narrowMark = 0.36;     ///< share of the cell's width
constexpr double leastRow = 0.86;       ///< share of the usual height
constexpr double slantedMost_px = 84.0; ///< longest slanted line

struct Making {
    const BoardInput& input;
    Scene& scene;
    BoardPicture& picture;
    double left = 0.0;   ///< where the columns begin
    double pitch = 0.0;  ///< of the columns
    double top = 0.0;    ///< where the rows begin
    double height = 0.0; ///< of a row
};

QString optionName(const studies::Snapshot& snapshot, int option) {
    return text(snapshot.variant(option).name);
}

int columnsOf(const studies::Snapshot& snapshot) {
    return snapshot.options() + 1;
}

// --- column titles ------------------------------------------------------------------------------

double widthOf(const std::vector<QString>& lines, const QFont& font) {
    double wide = 0.0;
    for (const auto& line : lines) {
        wide = std::max(wide, textSize(line, font).width());
    }
    return wide;
}

struct Header {
    bool slanted = false;
    double height = 0.0;
    double longest = 0.0; ///< of a slanted line
};

/// Level titles if each fits its column, else slanted ones with the room they need.
Header headerFor(const studies::Snapshot& snapshot, const Look& look, double pitch) {
    const QFont font = look.font(TextSize::small, TextWeight::strong); // the widest used
    const double line = look.lineHeight(TextSize::small);
    Header header;
    for (int option = -1; option < snapshot.options(); ++option) {
        header.longest =
            std::max(header.longest, widthOf(folded(optionName(snapshot, option), font), font));
    }
    header.slanted = header.longest > pitch - 0.5 * look.space.unit;
    header.longest = std::min(header.longest, slantedMost_px * look.scale);
    const double angle = slant_deg * std::numbers::pi / 180.0;
    header.height =
        header.slanted ? header.longest * std::sin(angle) + 2 * line * std::cos(angle) : 2 * line;
    header.height += 2 * look.space.unit;
    return header;
}

/// Falling towards its column: the room needed lies left, over the names of the studies, so that
/// the last name cannot run off at the right.
void laySlanted(const Making& making, BoardColumn& column, const QFont& font, double longest) {
    const auto& look = making.input.look;
    const double angle = slant_deg * std::numbers::pi / 180.0;
    const double high = look.lineHeight(TextSize::small) * static_cast<double>(column.lines.size());
    column.pivot = {column.column.center().x() - 0.5 * high * std::sin(angle),
                    making.top - 0.5 * look.space.unit};
    const double room = column.pivot.x() / std::cos(angle) - 2;
    const QFontMetricsF metrics(font);
    for (auto& words : column.lines) {
        words = metrics.elidedText(words, Qt::ElideRight, std::min(room, longest + 1));
    }
    QTransform turn;
    turn.translate(column.pivot.x(), column.pivot.y());
    turn.rotate(slant_deg);
    const double wide = widthOf(column.lines, font);
    column.shape.addPolygon(turn.map(QPolygonF(QRectF(-wide, -high, wide, high))));
    column.shape.closeSubpath();
}

void layLevel(const Making& making, BoardColumn& column, const QFont& font) {
    const auto& look = making.input.look;
    const double line = look.lineHeight(TextSize::small);
    double y = making.top - look.space.unit - line * static_cast<double>(column.lines.size());
    for (const auto& words : column.lines) {
        const double wide = textSize(words, font).width();
        column.boxes.push_back(QRectF(column.column.center().x() - wide / 2, y, wide, line));
        column.shape.addRect(column.boxes.back());
        y += line;
    }
}

void addColumn(Making& making, int position, const Header& header) {
    const auto& look = making.input.look;
    const int option = making.picture.firstColumn + position - 1;
    const QString name = optionName(making.input.snapshot, option);
    BoardColumn column;
    column.option = option;
    column.inHand = option == making.input.optionInHand;
    column.column = QRectF(making.left + position * making.pitch, 0, making.pitch, making.top);
    column.slanted = header.slanted;
    const QFont font =
        look.font(TextSize::small, column.inHand ? TextWeight::strong : TextWeight::normal);
    column.lines = folded(name, font);
    if (column.slanted) {
        laySlanted(making, column, font, header.longest);
    } else {
        layLevel(making, column, font);
    }
    Item item;
    item.shape = column.shape;
    item.kind = ItemKind::columnTitle;
    item.option = option;
    item.thing = option < 0
                     ? plant::Path{"base"}
                     : plant::Path{"options", making.input.snapshot.project().options.name(option)};
    item.box = item.shape.boundingRect();
    for (const auto& words : column.lines) {
        item.label += (item.label.isEmpty() ? QString() : QStringLiteral(" ")) + words;
    }
    item.description = (option < 0 ? QStringLiteral("Base: ") : QStringLiteral("Option: ")) + name;
    if (column.inHand) {
        item.description += QStringLiteral(", changes go into it");
    }
    making.picture.items.push_back(std::move(item));
    making.scene.columns.push_back(std::move(column));
}

// --- cells --------------------------------------------------------------------------------------

const studies::Cell* cellOf(const BoardInput& input, CellId id) {
    for (const auto& cell : input.cells) {
        if (cell.option == id.option && cell.study == id.study) {
            return &cell;
        }
    }
    return nullptr;
}

bool hasShare(const studies::Cell& cell, const results::Verdict& verdict) {
    const bool ended = cell.state == studies::CellState::done
                       || cell.state == studies::CellState::cutShort
                       || cell.state == studies::CellState::failed;
    return ended && verdict.mark != results::Mark::notRun
           && verdict.mark != results::Mark::notApplicable && std::isfinite(verdict.share);
}

QString stateWords(const studies::Cell& cell) {
    switch (cell.state) {
    case studies::CellState::waiting:
        return QStringLiteral("waiting");
    case studies::CellState::running:
        return QStringLiteral("running, %1 per cent done").arg(percent(cell.progress));
    case studies::CellState::cutShort:
        return QStringLiteral("cut short");
    case studies::CellState::failed:
        return QStringLiteral("failed");
    default:
        return words(markOf(cell));
    }
}

QString spokenCell(const Making& making, CellId id, const studies::Cell* cell) {
    const auto& snapshot = making.input.snapshot;
    const auto& variant = snapshot.variant(id.option);
    const auto& project = snapshot.project();
    QString out = text(project.studies.name(id.study)) + QStringLiteral(", ") + text(variant.name)
                  + QStringLiteral(": ");
    if (cell == nullptr) {
        return out + QStringLiteral("not run.");
    }
    out += stateWords(*cell);
    const auto* worst = limits::worst(cell->verdicts);
    if (worst != nullptr && hasShare(*cell, *worst) && worst->limit < variant.limits.size()) {
        out += QStringLiteral(", share left %1 per cent, worst limit %2. %3")
                   .arg(percent(worst->share), limitLetter(project, variant, worst->limit),
                        spokenVerdict(text(variant.limits.name(worst->limit)),
                                      variant.limits[worst->limit], *worst));
    } else {
        out += QLatin1Char('.');
    }
    if (cell->reason) {
        out += QLatin1Char(' ') + text(whatText(*cell->reason));
    }
    return out;
}

/// A share over the letter of its limit; the two lines may touch, they never overlap.
void labelCell(const Making& making, BoardCell& cell, const QRectF& frame,
               const results::Verdict& worst) {
    const auto& look = making.input.look;
    const auto& snapshot = making.input.snapshot;
    const double line = look.lineHeight(TextSize::small);
    const double step = std::min(line, (frame.height() - 2) / 2);
    const double first = frame.center().y() - step;
    const double left = cell.markBox.right() + 0.5 * look.space.unit;
    const QString share = percent(worst.share);
    // A long share comes nearer to the mark rather than being cut.
    const double needed = textSize(share, look.font(TextSize::small)).width();
    const double from = std::min(left, frame.right() - needed);
    cell.share = {share, QRectF(from, first, frame.right() - from, step)};
    cell.letter =
        quietLabel(limitLetter(snapshot.project(), snapshot.variant(cell.id.option), worst.limit),
                   QRectF(left, first + step, std::max(1.0, frame.right() - left), step));
}

void addCell(Making& making, CellId id, const QRectF& frame) {
    const auto& look = making.input.look;
    const auto* cell = cellOf(making.input, id);
    BoardCell out;
    out.id = id;
    out.frame = frame.adjusted(1, 1, -1, -1);
    out.mark = cell == nullptr ? MarkState::notRun : markOf(*cell);
    const bool started = cell != nullptr && cell->state == studies::CellState::running;
    out.progress = started ? std::clamp(cell->progress, 0.0, 1.0) : 0.0;
    const auto& shownRuns = making.input.selection.shown;
    const auto found = std::find(shownRuns.begin(), shownRuns.end(), id);
    out.shownAs = found == shownRuns.end() ? -1 : static_cast<int>(found - shownRuns.begin());
    if (out.mark == MarkState::running) {
        const double high = out.progress * out.frame.height();
        out.fill = QRectF(out.frame.left(), out.frame.bottom() - high, out.frame.width(), high);
    }
    // A narrow cell keeps room for "−10"; the mark stays readable.
    const double side = std::min(look.space.mark, narrowMark * frame.width());
    const double gap = 0.5 * look.space.unit;
    out.markBox = QRectF(frame.left() + gap, frame.center().y() - side / 2, side, side);
    const auto* worst = cell == nullptr ? nullptr : limits::worst(cell->verdicts);
    const bool known = worst != nullptr && hasShare(*cell, *worst);
    if (known) {
        labelCell(making, out, frame, *worst);
    }
    Item item;
    item.kind = ItemKind::cell;
    item.option = id.option;
    item.study = id.study;
    item.box = frame;
    item.shape.addRect(frame);
    item.label = out.share.text;
    item.description = spokenCell(making, id, cell);
    item.limit = known ? worst->limit : -1;
    making.picture.items.push_back(std::move(item));
    making.scene.cells.push_back(std::move(out));
}

// --- rows ---------------------------------------------------------------------------------------

/// A study's name on one line, or folded on two.
std::vector<Label> rowName(const Making& making, const QString& name, const QRectF& row,
                           TextWeight weight) {
    const auto& look = making.input.look;
    const double line = look.lineHeight(TextSize::small), gap = look.space.unit;
    const QFont font = look.font(TextSize::small, weight);
    const double left = classWidth * gap, wide = std::max(1.0, making.left - left - gap);
    const bool fits = textSize(name, font).width() <= wide;
    const auto lines = fits ? std::vector<QString>{name} : folded(name, font);
    const double step = std::min(line, (row.height() - 2) / static_cast<double>(lines.size()));
    double top = row.center().y() - step * static_cast<double>(lines.size()) / 2;
    std::vector<Label> out;
    for (const auto& words : lines) {
        out.push_back({words, QRectF(left, top, wide, step), TextSize::small, weight});
        top += step;
    }
    return out;
}

void addRow(Making& making, int study, double y) {
    const auto& look = making.input.look;
    const auto& studies = making.input.snapshot.project().studies;
    const double line = look.lineHeight(TextSize::small), gap = look.space.unit;
    BoardRow row;
    row.study = study;
    row.row = QRectF(0, y, making.input.size.width(), making.height);
    row.selected =
        !making.input.selection.shown.empty() && making.input.selection.inHand().study == study;
    const double middle = y + (making.height - line) / 2;
    const auto weight = row.selected ? TextWeight::strong : TextWeight::normal;
    row.letter = quietLabel(classLetter(studies[study].loadClass),
                            QRectF(gap, middle, (classWidth - 1) * gap, line));
    const QString name = text(studies.name(study));
    row.name = rowName(making, name, row.row, weight);
    Item item;
    item.kind = ItemKind::rowTitle;
    item.study = study;
    item.thing = {"studies", studies.name(study)};
    item.box = QRectF(0, y, making.left, making.height);
    item.shape.addRect(item.box);
    item.label = name;
    item.description =
        QStringLiteral("Study %1, class %2").arg(name, className(studies[study].loadClass));
    making.picture.items.push_back(std::move(item));
    making.scene.rows.push_back(std::move(row));
    for (int i = 0; i < making.picture.columnsShown; ++i) {
        addCell(making, {making.picture.firstColumn + i - 1, study},
                QRectF(making.left + i * making.pitch, y, making.pitch, making.height));
    }
}

void addLabel(Making& making, const QString& words, const QRectF& where) {
    Item item;
    item.kind = ItemKind::label;
    item.box = where;
    item.shape.addRect(where);
    item.label = item.description = words;
    making.picture.items.push_back(std::move(item));
    making.scene.labels.push_back(quietLabel(words, where));
}

/// Says what the numbers are, in as many words as find room beside the names of the options.
void addHeading(Making& making) {
    const auto& look = making.input.look;
    const double gap = look.space.unit;
    for (const char* words : {"headroom left, %", "left, %", "%"}) {
        const QString heading = QString::fromUtf8(words);
        const QSizeF size = textSize(heading, look.font(TextSize::small));
        for (const double y : {making.top - gap - size.height(), gap}) {
            const QRectF box(QPointF(gap, y), size);
            const bool taken =
                std::any_of(making.scene.columns.begin(), making.scene.columns.end(),
                            [&](const BoardColumn& column) {
                                return column.shape.intersects(box.adjusted(-2, -2, 2, 2));
                            });
            if (!taken && box.right() < making.input.size.width()) {
                addLabel(making, heading, box);
                return;
            }
        }
    }
}

QString outOfSight(const BoardPicture& picture, int rows, int columns) {
    QStringList parts;
    const auto add = [&](int count, const char* words) {
        if (count > 0) {
            parts << QStringLiteral("%1 %2").arg(count).arg(QLatin1String(words));
        }
    };
    add(picture.firstRow, "more above");
    add(rows - picture.firstRow - picture.rowsShown, "more below");
    add(picture.firstColumn, "more to the left");
    add(columns - picture.firstColumn - picture.columnsShown, "more to the right");
    return parts.join(QStringLiteral(" · "));
}

void layColumns(Making& making) {
    const auto& look = making.input.look;
    const auto& snapshot = making.input.snapshot;
    double names = 0.0, foldedNames = 0.0; // widest on one line, widest on two
    const QFont font = look.font(TextSize::small, TextWeight::strong);
    for (const auto& name : snapshot.project().studies.names()) {
        names = std::max(names, textSize(text(name), font).width());
        foldedNames = std::max(foldedNames, widthOf(folded(text(name), font), font));
    }
    const double width = making.input.size.width(), beside = 7 * look.space.unit;
    const int columns = columnsOf(snapshot);
    const double least = narrowest * look.scale;
    // Names are folded before the columns become narrow, and cut before they become too narrow.
    const double wanted = std::min(
        names + beside, std::max(foldedNames + beside, width - easy * look.scale * columns));
    making.left = std::min(wanted, std::max(0.25 * width, width - least * columns));
    making.left = std::min(making.left, std::max(0.0, width - least));
    const int fitting = std::max(1, static_cast<int>((width - making.left) / least + 1e-6));
    making.picture.columnsShown = std::min(columns, fitting);
    making.picture.firstColumn =
        std::clamp(making.input.firstColumn, 0, columns - making.picture.columnsShown);
    making.pitch =
        std::min((width - making.left) / making.picture.columnsShown, widest * look.scale);
}

void layRows(Making& making) {
    const auto& look = making.input.look;
    auto& picture = making.picture;
    const int rows = making.input.snapshot.studies();
    const double line = look.lineHeight(TextSize::small) + look.space.unit;
    const double room = std::max(0.0, making.input.size.height() - making.top);
    const bool columnsHidden = picture.columnsShown < columnsOf(making.input.snapshot);
    making.height = look.space.row;
    if (rows > 0 && rows * making.height > room - (columnsHidden ? line : 0.0)) {
        making.height =
            std::max(leastRow * look.space.row, (room - (columnsHidden ? line : 0.0)) / rows);
    }
    const bool all = rows * making.height <= room - (columnsHidden ? line : 0.0) + 0.5;
    picture.rowsShown = all ? rows : std::max(0, static_cast<int>((room - line) / making.height));
    picture.firstRow = std::clamp(making.input.firstRow, 0, std::max(0, rows - picture.rowsShown));
}

} // namespace

BoardPicture boardPicture(const BoardInput& input) {
    auto scene = std::make_shared<BoardPicture::Scene>(input.look);
    BoardPicture picture;
    Making making{input, *scene, picture};
    layColumns(making);
    const Header header = headerFor(input.snapshot, input.look, making.pitch);
    making.top = header.height;
    layRows(making);
    scene->headerBottom = making.top;
    scene->width = input.size.width();
    const double line = input.look.lineHeight(TextSize::small), gap = input.look.space.unit;
    for (int i = 0; i < picture.columnsShown; ++i) {
        addColumn(making, i, header);
    }
    addHeading(making);
    for (int i = 0; i < picture.rowsShown; ++i) {
        addRow(making, picture.firstRow + i, making.top + i * making.height);
    }
    const QString hidden = outOfSight(picture, input.snapshot.studies(), columnsOf(input.snapshot));
    if (!hidden.isEmpty()) {
        addLabel(making, hidden,
                 QRectF(gap, making.top + picture.rowsShown * making.height,
                        input.size.width() - 2 * gap, line + gap));
    }
    if (input.snapshot.studies() == 0) {
        addLabel(making, QStringLiteral("No studies yet."),
                 QRectF(gap, making.top + gap, input.size.width() - 2 * gap, line));
    }
    picture.scene_ = std::move(scene);
    return picture;
}

double boardHeight(const studies::Snapshot& snapshot, const Look& look, double width_px) {
    static const std::vector<studies::Cell> noCells;
    auto scene = std::make_shared<BoardPicture::Scene>(look);
    BoardPicture picture;
    const BoardInput input{snapshot, noCells, {}, QSizeF(width_px, 1e6), look};
    Making making{input, *scene, picture};
    layColumns(making);
    const bool hidden = picture.columnsShown < columnsOf(snapshot);
    return headerFor(snapshot, look, making.pitch).height + snapshot.studies() * look.space.row
           + (hidden ? look.lineHeight(TextSize::small) + look.space.unit : 0.0) + look.space.unit;
}

} // namespace headroom::drawing
