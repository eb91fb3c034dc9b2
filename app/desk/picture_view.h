// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"
#include "drawing/picture.h"

#include <QWidget>

namespace headroom::desk {

/// A widget that shows a picture made of items: painter, pointer, screen reader and tests read the
/// same list. A subclass makes the picture and says what pressing an item means.
class PictureView : public QWidget {
    Q_OBJECT
public:
    explicit PictureView(QWidget* parent = nullptr);

    virtual const drawing::Items& items() const = 0;
    /// One paragraph for a screen reader and for F1.
    virtual QString description() const;
    /// The item of a kind that stands for something, or nullptr; for keys and tests.
    const drawing::Item* find(drawing::ItemKind kind, const plant::Path& thing) const;
    void setLook(const drawing::Look& look);
    const drawing::Look& currentLook() const { return *look_; }

signals:
    void pressed(const headroom::drawing::Item& item, Qt::KeyboardModifiers modifiers);
    void pressedNothing();
    void described(const QString& words); ///< what is under the pointer, for the status line

protected:
    /// Makes the picture for the present state; called when it is next asked for or painted, so
    /// that several changes in one turn cost one picture.
    virtual void remake() = 0;
    void outdate();      ///< the picture is to be made again
    void fresh() const;  ///< makes it if it is outdated
    void paintFocus(QPainter& painter) const;

    void mousePressEvent(QMouseEvent* event) override;
    void mouseMoveEvent(QMouseEvent* event) override;
    void leaveEvent(QEvent* event) override;
    void resizeEvent(QResizeEvent* event) override;
    void focusInEvent(QFocusEvent* event) override;
    void focusOutEvent(QFocusEvent* event) override;
    bool event(QEvent* event) override;

private:
    const drawing::Look* look_;
    bool stale_ = true;
    bool ring_ = false; ///< the keyboard brought the focus here
};

/// Whether focus that came for this reason is shown by a ring: the keyboard moved it.
bool byKeyboard(Qt::FocusReason reason);

/// Lets the screen reader see the items as children; once, before the first window.
void installAccessiblePictures();

} // namespace headroom::desk
