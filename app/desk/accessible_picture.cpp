// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/picture_view.h"

#include <QAccessibleInterface>
#include <QAccessibleWidget>
#include <QPointer>
#include <map>
#include <vector>

/// The items of a picture as children of its widget, for screen readers.
namespace headroom::desk {

namespace {

bool spoken(const drawing::Item& item) { return !item.description.isEmpty(); }

/// One item, found again by its place among the spoken ones.
class ItemInterface final : public QAccessibleInterface {
public:
    ItemInterface(PictureView* view, int place) : view_(view), place_(place) {}

    bool isValid() const override { return item() != nullptr; }
    QObject* object() const override { return nullptr; }
    QWindow* window() const override {
        return view_ ? view_->window()->windowHandle() : nullptr;
    }
    QAccessibleInterface* parent() const override {
        return view_ ? QAccessible::queryAccessibleInterface(view_) : nullptr;
    }
    QAccessibleInterface* child(int) const override { return nullptr; }
    QAccessibleInterface* childAt(int, int) const override { return nullptr; }
    int childCount() const override { return 0; }
    int indexOfChild(const QAccessibleInterface*) const override { return -1; }
    QString text(QAccessible::Text kind) const override {
        const auto* at = item();
        return at != nullptr && (kind == QAccessible::Name || kind == QAccessible::Description)
                   ? at->description
                   : QString();
    }
    void setText(QAccessible::Text, const QString&) override {}
    QRect rect() const override {
        const auto* at = item();
        return at == nullptr ? QRect()
                             : QRect(view_->mapToGlobal(at->box.topLeft().toPoint()),
                                     at->box.size().toSize());
    }
    QAccessible::Role role() const override {
        const auto* at = item();
        if (at == nullptr) {
            return QAccessible::NoRole;
        }
        switch (at->kind) {
        case drawing::ItemKind::cell: return QAccessible::Cell;
        case drawing::ItemKind::rowTitle: return QAccessible::RowHeader;
        case drawing::ItemKind::columnTitle: return QAccessible::ColumnHeader;
        case drawing::ItemKind::bar: return QAccessible::ListItem;
        case drawing::ItemKind::label: return QAccessible::StaticText;
        default: return QAccessible::Graphic;
        }
    }
    QAccessible::State state() const override { return {}; }

private:
    const drawing::Item* item() const {
        int place = 0;
        for (const auto& at : view_ ? view_->items() : drawing::Items{}) {
            if (spoken(at) && place++ == place_) {
                return &at;
            }
        }
        return nullptr;
    }
    QPointer<PictureView> view_;
    int place_;
};

class PictureInterface final : public QAccessibleWidget {
public:
    explicit PictureInterface(PictureView* view)
        : QAccessibleWidget(view, QAccessible::Canvas), view_(view) {}
    ~PictureInterface() override {
        for (const auto& [place, id] : made_) {
            QAccessible::deleteAccessibleInterface(id);
        }
    }

    int childCount() const override {
        int count = 0;
        for (const auto& item : view_->items()) {
            count += spoken(item) ? 1 : 0;
        }
        return count;
    }
    QAccessibleInterface* child(int place) const override {
        if (place < 0 || place >= childCount()) {
            return nullptr;
        }
        auto found = made_.find(place);
        if (found == made_.end()) {
            const auto id = QAccessible::registerAccessibleInterface(new ItemInterface(view_, place));
            found = made_.emplace(place, id).first;
        }
        return QAccessible::accessibleInterface(found->second);
    }
    int indexOfChild(const QAccessibleInterface* child) const override {
        for (const auto& [place, id] : made_) {
            if (QAccessible::accessibleInterface(id) == child) {
                return place;
            }
        }
        return -1;
    }
    QAccessibleInterface* childAt(int x, int y) const override {
        const auto at = view_->mapFromGlobal(QPoint(x, y));
        const auto* hit = drawing::itemAt(view_->items(), QPointF(at));
        int place = 0;
        for (const auto& item : view_->items()) {
            if (&item == hit) {
                return spoken(item) ? child(place) : nullptr;
            }
            place += spoken(item) ? 1 : 0;
        }
        return nullptr;
    }
    QString text(QAccessible::Text kind) const override {
        return kind == QAccessible::Description ? view_->description()
                                                : QAccessibleWidget::text(kind);
    }

private:
    PictureView* view_;
    mutable std::map<int, QAccessible::Id> made_;
};

QAccessibleInterface* makeInterface(const QString&, QObject* object) {
    auto* view = qobject_cast<PictureView*>(object);
    return view == nullptr ? nullptr : new PictureInterface(view);
}

} // namespace

void installAccessiblePictures() {
    static const bool once = [] {
        QAccessible::installFactory(makeInterface);
        return true;
    }();
    (void)once;
}

} // namespace headroom::desk
