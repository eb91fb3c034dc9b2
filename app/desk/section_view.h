// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/picture_view.h"
#include "desk/workbench.h"
#include "drawing/ribbon_picture.h"
#include "drawing/section_picture.h"

#include <QPixmap>
#include <optional>

namespace headroom::desk {

/// The plant's longitudinal section: drawing surface and result picture in one. What does not
/// move with the cursor is kept in a pixmap.
class SectionView final : public PictureView {
    Q_OBJECT
public:
    explicit SectionView(Workbench& bench, QWidget* parent = nullptr);

    const drawing::Items& items() const override;
    QString description() const override;
    void setScales(drawing::Scales scales);
    /// Where a thing or value is drawn, for the slip; the middle if it has no place of its own.
    QRectF placeOf(const plant::Path& path) const;
    void walk(int steps); ///< selects the next thing downstream or upstream

signals:
    void slipAsked(const QString& typed); ///< a digit, sign or Enter was pressed on a thing

protected:
    void remake() override;
    void paintEvent(QPaintEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;

private:
    Workbench& bench_;
    std::optional<drawing::SectionPicture> picture_;
    QPixmap still_;
    drawing::Scales scales_ = drawing::Scales::three;
};

/// Metres left along the same chainage, and the ruler.
class RibbonView final : public PictureView {
    Q_OBJECT
public:
    explicit RibbonView(Workbench& bench, QWidget* parent = nullptr);

    const drawing::Items& items() const override;
    void setScales(drawing::Scales scales);

protected:
    void remake() override;
    void paintEvent(QPaintEvent* event) override;

private:
    Workbench& bench_;
    std::optional<drawing::RibbonPicture> picture_;
    drawing::Scales scales_ = drawing::Scales::three;
};

} // namespace headroom::desk
